import type { Chosen } from '../study/chosen.ts';
import type { Optimised } from '../study/optimise.ts';
import { moveUnits } from './move-units.ts';

/** What `optimise` found as `--json` hands it out; settings in their natural units, figures in those of formulas. */
export function optimiseJson(found: Optimised): unknown {
  const { flowsheet, objective, outcome, best } = found;
  const units = moveUnits(flowsheet, objective.moves);
  const settingsOf = (values: readonly number[]) =>
    Object.fromEntries(units.map(({ path, natural }, i) => [path, natural(values[i]!)]));
  return {
    title: flowsheet.title,
    case: flowsheet.caseName,
    outcome,
    failure: found.failure === '' ? null : found.failure,
    goals: objective.goals.map(({ sense, text, unit }, g) => ({
      sense,
      formula: text,
      unit,
      value: best === null ? null : best.case.goals[g],
    })),
    settings: units.map(({ path, unit, natural }, i) => ({
      path,
      unit,
      low: natural(objective.moves[i]!.between[0]),
      high: natural(objective.moves[i]!.between[1]),
      value: best === null ? null : natural(best.settings[i]!),
      at_bound: best?.atBound[i] ?? null,
    })),
    limits: objective.limits.map(({ text, formula, side, bound }, k) => ({
      limit: text,
      formula: formula.text,
      side,
      bound,
      value: best === null ? null : best.case.figures[k],
      met: best === null ? null : best.case.c[k]! <= 1e-6,
      active: best?.active[k] ?? null,
      worth: found.worth[k] ?? null,
    })),
    money: moneyJson(found),
    front: found.front.map((point) => ({
      goals: point.case.goals,
      settings: settingsOf(point.settings),
      held_by: heldBy(found, point),
    })),
    reach: found.reach.map(({ limit, nearest, settings, canBeMet }) => ({
      limit: objective.limits[limit]!.text,
      nearest,
      can_be_met: canBeMet,
      settings: settingsOf(settings),
    })),
    curve: found.curve.map(({ move, value, goal, broken }) => ({
      setting: units[move]!.path,
      value: units[move]!.natural(value),
      goal,
      broken: broken.map((k) => objective.limits[k]!.text),
    })),
    starts: found.starts.map(({ start, settings, goal, meetsLimits }) => ({
      from: settingsOf(start),
      to: settingsOf(settings),
      goal,
      limits_met: meetsLimits,
    })),
    closings: found.evaluations,
    passes: found.passes,
  };
}

function moneyJson({ flowsheet: { prices }, best }: Optimised): unknown {
  if (prices === null || best === null) return null;
  return {
    currency: prices.currency,
    items: prices.items.map(({ name, price, income }, k) => ({
      name,
      price,
      per_hour: (income ? 1 : -1) * best.case.money[k]!,
    })),
  };
}

function heldBy({ objective }: Optimised, point: Chosen): string[] {
  return [
    ...objective.moves.filter((_, i) => point.atBound[i] !== null).map(({ path }) => path),
    ...objective.limits.filter((_, k) => point.active[k]).map(({ text }) => text),
  ];
}
