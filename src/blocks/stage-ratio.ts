/**
 * The pressure ratio of each stage: equal ratios take the least work. With a drop p in each cooler it solves
 *   (…((P₁ r − p) r − p)…) r = P₂,
 * which rises with r, by halving.
 */
export function stageRatio(inletPa: number, targetPa: number, stages: number, dropPa: number): number {
  const plain = (targetPa / inletPa) ** (1 / stages);
  if (dropPa === 0 || stages === 1) return plain;
  const reaches = (ratio: number) => {
    let pressurePa = inletPa;
    for (let k = 1; k < stages; k++) pressurePa = pressurePa * ratio - dropPa;
    return pressurePa > 0 ? pressurePa * ratio : 0;
  };
  let low = plain;
  let high = plain + 1;
  while (reaches(high) < targetPa) high *= 2;
  for (let step = 0; step < 60 && high - low > 1e-15 * high; step++) {
    const middle = 0.5 * (low + high);
    if (reaches(middle) < targetPa) low = middle;
    else high = middle;
  }
  return 0.5 * (low + high);
}
