import type { Shape } from '../model/spread.ts';
import type { DrawnSpread, FigureSpread, Uncertainty } from '../study/uncertainty.ts';

/** The result of `uncertainty` as `--json` hands it out; what was drawn is in the natural unit of its setting. */
export function uncertaintyJson(found: Uncertainty): unknown {
  const { flowsheet, options, spreads, figures, failures } = found;
  return {
    title: flowsheet.title,
    case: flowsheet.caseName,
    samples: options.samples,
    seed: options.seed,
    method: options.method,
    closed: options.samples - found.failed,
    failed: found.failed,
    extra_cases: found.extraCases,
    extra_failed: found.extraFailed,
    failures: failures.map(({ reason, count, first }) => ({ reason, count, first_sample: first })),
    spreads: Object.fromEntries(spreads.map((one) => [one.spread.path, spreadJson(one)])),
    correlations: flowsheet.correlations,
    figures: Object.fromEntries(figures.map((figure) => [figure.expression, figureJson(figure)])),
  };
}

function spreadJson({ spread, setting, distribution }: DrawnSpread) {
  return {
    unit: setting.unit,
    ...inUnits(spread.shape, setting.unitSI),
    cut_below: distribution.cutBelow,
    cut_above: distribution.cutAbove,
  };
}

/** The shape with its values in natural units; a factor and the kind have none. */
function inUnits(shape: Shape, unitSI: number) {
  return Object.fromEntries(
    Object.entries(shape).map(([key, value]) => [
      key,
      typeof value === 'number' && key !== 'factor' ? value / unitSI : value,
    ]),
  );
}

function figureJson({ asInFile, summary, heldBy, shares }: FigureSpread) {
  return {
    in_file: asInFile,
    count: summary?.count ?? 0,
    mean: summary?.mean ?? null,
    mean_error: summary?.meanError ?? null,
    sd: summary?.sd ?? null,
    held_by: heldBy,
    percentiles: Object.fromEntries(
      (summary?.percentiles ?? []).map(({ percent, value, low, high }) => [percent, { value, low, high }]),
    ),
    shares: Object.fromEntries(
      shares.map(({ path, rankCorrelation, rankShare, together, sobol }) => [
        path,
        {
          rank_correlation: rankCorrelation,
          rank_share: rankShare,
          together: together.length > 1 ? together : null,
          first: sobol?.first ?? null,
          first_error: sobol?.firstError ?? null,
          total: sobol?.total ?? null,
          total_error: sobol?.totalError ?? null,
          rows: sobol?.rows ?? null,
        },
      ]),
    ),
  };
}
