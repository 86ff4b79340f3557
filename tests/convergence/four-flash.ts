import type { FixedPointProblem } from '../../src/convergence/driver.ts';

/**
 * The four-flash recycle: feed + liquid of F1 + vapour of F3 -> F2; vapour of F2 -> F1; liquid of F2 + vapour
 * of F4 -> F3; liquid of F3 -> F4. Sixteen components, N2, CO2, H2S, CH4 to nC11; constant K values.
 * Feed and pressures: R. H. Cavett, Proc. Am. Petrol. Inst. 43 (1963) 57-76, from memory (total 27340.6 lbmol/h).
 * K = (Pc/P) exp(5.373 (1 + w)(1 - Tc/T)) rounded to five digits, and the solution computed from them, are ours.
 */
const feed = [
  358.2, 4965.6, 339.4, 2995.5, 2395.5, 2291.0, 604.1, 1539.9, 790.4, 1129.9, 1764.7, 2606.7, 1844.5, 1669.0,
  831.7, 1214.5,
];
const K1 = [
  16.573, 1.5165, 0.49111, 6.7111, 0.96481, 0.23398, 0.089072, 0.063194, 0.02528, 0.019369, 0.0064943,
  0.0023015, 0.00087412, 0.0003441, 0.00014005, 5.7867e-5,
];
const K2 = [
  51.276, 5.4179, 1.7952, 21.543, 3.3724, 0.86326, 0.33988, 0.24517, 0.10132, 0.078682, 0.02755, 0.010178,
  0.0040178, 0.0016424, 0.00069335, 0.00029759,
];
const K3 = [
  208.55, 18.518, 5.9684, 83.799, 11.835, 2.8381, 1.0728, 0.7585, 0.30138, 0.23026, 0.07651, 0.02688,
  0.010127, 0.0039553, 0.0015976, 0.00065491,
];
const K4 = [
  458.01, 37.361, 11.88, 180.08, 24.189, 5.6186, 2.0821, 1.4578, 0.56822, 0.43071, 0.1395, 0.047823, 0.017612,
  0.0067274, 0.0026594, 0.001066,
];

/** Closed feeds of F2 and F3 [lbmol/h], four decimals. */
export const fourFlashSolution = [
  ...[
    381.2217, 8665.8005, 1128.595, 3474.0521, 5356.3115, 8252.0031, 1217.5595, 2589.0141, 984.2838, 1338.7303,
    1870.4401, 2661.8617, 1859.415, 1674.3634, 832.7996, 1215.1716,
  ],
  ...[
    8.7988, 1722.6971, 544.9732, 187.6831, 1598.1864, 5990.1824, 1130.6755, 2483.9405, 975.9629, 1330.4885,
    1866.0304, 2658.5016, 1858.1682, 1673.7885, 832.6562, 1215.0679,
  ],
];

const n = feed.length;

/** The loop torn before F2 and F3: variables are the feeds of both flashes. */
export function fourFlashProblem(): FixedPointProblem {
  const gas = new Float64Array(n);
  const top = new Float64Array(n);
  const tail = new Float64Array(n);
  return {
    size: 2 * n,
    lower: new Float64Array(2 * n),
    evaluate(x, g) {
      const to2 = x.subarray(0, n);
      const to3 = x.subarray(n);
      flash(to2, K2, gas);
      flash(gas, K1, top);
      for (let i = 0; i < n; i++) {
        g[i] = feed[i] + gas[i] - top[i];
        g[n + i] = to2[i] - gas[i];
      }
      flash(to3, K3, gas);
      for (let i = 0; i < n; i++) {
        g[i] += gas[i];
        tail[i] = to3[i] - gas[i];
      }
      flash(tail, K4, gas);
      for (let i = 0; i < n; i++) g[n + i] += gas[i];
    },
  };
}

/** Start as if every recycle were empty: feed before F2, a third of it before F3. */
export const fourFlashStart = [...feed, ...feed.map((f) => f / 3)];

/** Rachford-Rice by bisection; writes the vapour flows. */
function flash(flows: Float64Array, K: readonly number[], vapour: Float64Array): void {
  let low = 0;
  let high = 1;
  const balance = (V: number): number => {
    let sum = 0;
    for (let i = 0; i < n; i++) sum += (flows[i] * (K[i] - 1)) / (1 + V * (K[i] - 1));
    return sum;
  };
  if (balance(0) <= 0) high = 0;
  else if (balance(1) >= 0) low = 1;
  for (let k = 0; k < 60 && low < high; k++) {
    const V = (low + high) / 2;
    if (balance(V) > 0) low = V;
    else high = V;
  }
  const V = (low + high) / 2;
  for (let i = 0; i < n; i++) vapour[i] = (flows[i] * V * K[i]) / (1 + V * (K[i] - 1));
}
