import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import type { Flowsheet } from '../../src/model/flowsheet.ts';
import { balance } from '../../src/tally/balance.ts';

const text = readFileSync(new URL('ammonia.yaml', import.meta.url), 'utf8');

async function read(source: string): Promise<Flowsheet> {
  const { flowsheet, diagnostics } = await readFlowsheet(source, { file: 'f.yaml' });
  if (flowsheet === null) throw new Error(JSON.stringify(diagnostics, null, 1));
  return flowsheet;
}

/** Everything that was read but the functions of its formulas. */
const plain = (flowsheet: Flowsheet): unknown => JSON.parse(JSON.stringify(flowsheet));

test.each<[string, (source: string) => string]>([
  ['a byte-order mark at its head', (s) => `\ufeff${s}`],
  ['CRLF', (s) => s.replaceAll('\n', '\r\n')],
  ['lone CR', (s) => s.replaceAll('\n', '\r')],
  ['a byte-order mark and CRLF', (s) => `\ufeff${s.replaceAll('\n', '\r\n')}`],
  ['no line end at its end', (s) => s.trimEnd()],
  ['tabs behind values and before comments', (s) => s.replaceAll('\n', '\t# note\n')],
  ['a line --- before it', (s) => `---\n${s}`],
  ['%YAML 1.2 before it', (s) => `%YAML 1.2\n---\n${s}`],
  ['a line ... behind it', (s) => `${s}...\n`],
  ['comments only behind the end', (s) => `${s}...\n# no more\n`],
  ['blanks and empty lines', (s) => `\n\n${s.replaceAll('\n', '   \n\n')}`],
  ['no-break spaces before units', (s) => s.replaceAll(/(\d) (degC|bar|kmol)/g, '$1\u00a0$2')],
  ['thin spaces before units', (s) => s.replaceAll(/(\d) (degC|bar|kmol)/g, '$1\u2009$2')],
  ['keys in quotes', (s) => s.replaceAll(/^( *)(\w+):/gm, '$1"$2":')],
  ['anchors that nothing uses', (s) => s.replaceAll(/pressure: (\d+) bar/g, 'pressure: &p $1 bar')],
])('a file with %s is the same file', async (_, change) => {
  const [one, other] = [await read(text), await read(change(text))];
  expect(plain(other)).toEqual(plain({ ...one, file: 'f.yaml' }));
});

const minimal = (values: {
  readonly part?: string;
  readonly name?: string;
  readonly more?: string;
}): string =>
  `looptally: 1
components: [NO, N2]
feeds:
  makeup: {flow: 1e2 kmol/h, temperature: +20 degC, pressure: 010 bar, composition: {NO: ${values.part ?? '1'}, N2: 1}}
blocks:
  ${values.name ?? 'valve'}: {kind: valve, pressure: 5. bar}
streams: {S1: makeup -> ${values.name ?? 'valve'}, S2: ${values.name ?? 'valve'} -> out}
${values.more ?? ''}`;

test.each([
  ['1e3', 1000],
  ['1E+3', 1000],
  ['.5', 0.5],
  ['5.', 5],
  ['+5', 5],
  ['010', 10],
  ['-0', 0],
  ['"3"', 3],
  ["'3'", 3],
  ['3 %', 0.03],
  ['1e-300', 1e-300],
])('a part written %s is %d', async (part, value) => {
  const one = part.includes('%') ? minimal({ part }).replace('N2: 1}', 'N2: 97 %}') : minimal({ part });
  expect((await read(one)).feeds[0]!.parts[0]).toBe(value);
});

test('what YAML 1.1 takes for something else is text or a decimal number here', async () => {
  const { components, feeds, blocks } = await read(minimal({}));
  // NO is nitric oxide and not false; 010 is ten and not eight
  expect(components[0]!.id).toBe('NO');
  expect(feeds[0]!.pressurePa).toBe(10e5);
  expect(feeds[0]!.temperatureK).toBe(293.15);
  expect(blocks[0]!.settings['pressure']).toBe(5e5);
});

// What every object in JavaScript has: as names they are words like any other.
const inherited = [
  'toString',
  'hasOwnProperty',
  'valueOf',
  'isPrototypeOf',
  'toLocaleString',
  'propertyIsEnumerable',
];

test.each(inherited)(
  '%s may name a block, feed, stream, component, reaction, case, aim and figure',
  async (name) => {
    const source = `looptally: 1
components: {H2: , N2: , ${name}: {formula: NH3, source: invented, formation_enthalpy: -46 kJ/mol, entropy: 193 J/(mol K), heat_capacity: 35 J/(mol K)}}
reactions: {${name}: N2 + 3 H2 <=> 2 ${name}}
feeds:
  feed: {flow: 100 kmol/h, temperature: 400 degC, pressure: 10 bar, composition: {H2: 3, N2: 1, ${name}: 0.1}}
blocks:
  ${name}: {kind: reactor, reactions: {${name}: {approach: 0 K}}, temperature: 400 degC}
streams: {S1: feed -> ${name}, ${name}: ${name} -> out}
figures:
  ${name}: {formula: streams.${name}.n.${name}}
  twice: {formula: 2 * figures.user.${name} + 0 * blocks.${name}.duty}
aims: {${name}: {move: ${name}.temperature, between: [300 degC, 500 degC], until: streams.${name}.y.${name} = 5 %}}
cases: {${name}: {${name}.temperature: 410 degC}}
spreads: {feed.temperature: {kind: uniform, low: 390 degC, high: 410 degC}}
`;
    const { flowsheet } = await readFlowsheet(source, { file: 'f.yaml', case: name });
    expect(flowsheet?.cases).toEqual([name]);
    const { result } = balance(await read(source));
    expect(result.convergence.converged).toBe(true);
    expect(result.aims[name]?.reached).toBe(true);
    const { user } = result.figures;
    expect(user['twice']).toBeCloseTo(2 * user[name]!, 9);
    expect(user[name]).toBeGreaterThan(1);
  },
);

test('a path that leads to what every object has is no setting and no figure', async () => {
  for (const name of [...inherited, 'constructor', '__proto__']) {
    for (const set of [`${name}=1`, `valve.${name}=1`, `solve.${name}=1`, `valve.pressure.${name}=1`]) {
      const { flowsheet, diagnostics } = await readFlowsheet(minimal({}), { file: 'f.yaml', set: [set] });
      expect(flowsheet, set).toBeNull();
      expect(diagnostics.map(({ code }) => code).join(), set).toMatch(/^(unknown-setting|unknown-key)$/);
    }
    const { flowsheet } = await readFlowsheet(
      minimal({ more: `figures: {a: {formula: streams.S2.${name}}}` }),
      {
        file: 'f.yaml',
      },
    );
    expect(flowsheet, name).toBeNull();
  }
});

test('long text where text belongs is read', async () => {
  const { title, notes } = await read(
    `${text.replace(/^title:.*$/m, `title: ${'x'.repeat(500_000)}`)}notes: |\n  a\n  b\n`,
  );
  expect(title).toHaveLength(500_000);
  expect(notes).toBe('a\nb\n');
});
