import { ATM } from './rate-law.ts';

/**
 * ln φ of nitrogen, hydrogen and ammonia, each as if alone in the mixture:
 *   N2   φ = 0.93431737 + 0.3101804e-3 T + 0.295896e-3 P − 0.2707279e-6 T² + 0.4775207e-6 P²
 *   H2   ln φ = exp(−3.8402 T^0.125 + 0.541) P − exp(−0.1263 T^0.5 − 15.98) P²
 *               + 300 exp(−0.011901 T − 5.941) (exp(−P/300) − 1)
 *   NH3  φ = 0.1438996 + 0.2028538e-2 T − 0.4487672e-3 P − 0.1142945e-5 T² + 0.2761216e-6 P²
 * with P in atm. Some copies print 5.491 for 5.941.
 *
 * The polynomials turn over far outside the authors' range; they are asked at 550–900 K and 0–400 atm at most.
 *
 * @param P [Pa]  @param out  N2, H2, NH3
 * @source D. C. Dyson, J. M. Simon, Ind. Eng. Chem. Fundam. 7 (1968) 605-610 (from memory)
 */
export function lnPhiOfDysonSimon(temperatureK: number, pressurePa: number, out: Float64Array): void {
  const T = Math.min(Math.max(temperatureK, 550), 900);
  const P = Math.min(pressurePa / ATM, 400);
  out[0] = Math.log(
    0.93431737 + 0.3101804e-3 * T + 0.295896e-3 * P - 0.2707279e-6 * T * T + 0.4775207e-6 * P * P,
  );
  out[1] =
    Math.exp(-3.8402 * T ** 0.125 + 0.541) * P -
    Math.exp(-0.1263 * Math.sqrt(T) - 15.98) * P * P +
    300 * Math.exp(-0.011901 * T - 5.941) * Math.expm1(-P / 300);
  out[2] = Math.log(
    0.1438996 + 0.2028538e-2 * T - 0.4487672e-3 * P - 0.1142945e-5 * T * T + 0.2761216e-6 * P * P,
  );
}
