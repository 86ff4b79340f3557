/**
 * SHA-256 of a text in UTF-8, in base64, as a content security policy names an inline script. The core has no crypto
 * module of a platform, and a browser's own is not there for a page opened from disk.
 *
 * @source FIPS PUB 180-4 (2015), section 6.2
 */
export function sha256Base64(text: string): string {
  const message = padded(new TextEncoder().encode(text));
  const H = Uint32Array.from(FIRST_ROOTS);
  const W = new Uint32Array(64);
  for (let block = 0; block < message.byteLength; block += 64) {
    for (let t = 0; t < 16; t++) W[t] = message.getUint32(block + 4 * t);
    for (let t = 16; t < 64; t++) {
      const a = W[t - 15]!;
      const b = W[t - 2]!;
      const sigma0 = turned(a, 7) ^ turned(a, 18) ^ (a >>> 3);
      const sigma1 = turned(b, 17) ^ turned(b, 19) ^ (b >>> 10);
      W[t] = W[t - 16]! + sigma0 + W[t - 7]! + sigma1;
    }
    compress(H, W);
  }
  const bytes = new DataView(new ArrayBuffer(32));
  H.forEach((word, k) => {
    bytes.setUint32(4 * k, word);
  });
  return base64(new Uint8Array(bytes.buffer));
}

function compress(H: Uint32Array, W: Uint32Array): void {
  let [a, b, c, d, e, f, g, h] = H as unknown as number[];
  for (let t = 0; t < 64; t++) {
    const choice = (e! & f!) ^ (~e! & g!);
    const T1 = h! + (turned(e!, 6) ^ turned(e!, 11) ^ turned(e!, 25)) + choice + K[t]! + W[t]!;
    const majority = (a! & b!) ^ (a! & c!) ^ (b! & c!);
    const T2 = (turned(a!, 2) ^ turned(a!, 13) ^ turned(a!, 22)) + majority;
    h = g;
    g = f;
    f = e;
    e = (d! + T1) >>> 0;
    d = c;
    c = b;
    b = a;
    a = (T1 + T2) >>> 0;
  }
  [a, b, c, d, e, f, g, h].forEach((word, k) => {
    H[k] = H[k]! + word!;
  });
}

function padded(bytes: Uint8Array): DataView {
  const length = 64 * Math.ceil((bytes.length + 9) / 64);
  const message = new Uint8Array(length);
  message.set(bytes);
  message[bytes.length] = 0x80;
  const view = new DataView(message.buffer);
  view.setUint32(length - 8, Math.floor(bytes.length / 2 ** 29));
  view.setUint32(length - 4, (bytes.length << 3) >>> 0);
  return view;
}

function turned(word: number, by: number): number {
  return (word >>> by) | (word << (32 - by));
}

/** The first 32 bits of the fractions of square and cube roots of the first primes, as the standard defines them. */
const PRIMES = Array.from({ length: 312 }, (_, n) => n).filter(
  (n) => n > 1 && Array.from({ length: n }, (_, d) => d).every((d) => d < 2 || n % d !== 0),
);
const K = Uint32Array.from(PRIMES.slice(0, 64), (prime) => fraction(Math.cbrt(prime)));
const FIRST_ROOTS = PRIMES.slice(0, 8).map((prime) => fraction(Math.sqrt(prime)));

function fraction(root: number): number {
  return Math.floor((root % 1) * 2 ** 32);
}

const DIGITS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

function base64(bytes: Uint8Array): string {
  let text = '';
  for (let k = 0; k < bytes.length; k += 3) {
    const word = (bytes[k]! << 16) | ((bytes[k + 1] ?? 0) << 8) | (bytes[k + 2] ?? 0);
    const digits = [18, 12, 6, 0].map((shift) => DIGITS[(word >> shift) & 63]!);
    text += digits.slice(0, Math.min(4, bytes.length - k + 1)).join('');
  }
  return text.padEnd(4 * Math.ceil(text.length / 4), '=');
}
