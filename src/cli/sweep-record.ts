import { formulaRoots, misnamed, nearestName, worldOf } from '../flowsheet/formula-scope.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import { compileFormula, type FormulaName } from '../units/formula.ts';
import { type UsageFault, usageRefusals } from './refusal.ts';
import type { FirstCase } from './sweep-first-case.ts';

/** Expressions of `--record A,B --record C`, a comma inside brackets aside; each with the word it stands in. */
function expressionsOf(words: readonly string[]) {
  return words.flatMap((word) => {
    const found: { text: string; at: string; offset: number }[] = [];
    let depth = 0;
    let start = 0;
    for (let k = 0; k <= word.length; k++) {
      if (word[k] === '(') depth++;
      else if (word[k] === ')') depth--;
      if (k < word.length && !(word[k] === ',' && depth <= 0)) continue;
      const piece = word.slice(start, k);
      const lead = piece.search(/\S|$/);
      found.push({ text: piece.trim(), at: word, offset: start + lead });
      start = k + 1;
    }
    return found;
  });
}

/** Check what `--record` names against the flowsheet. @throws Refusal with all that is wrong */
export function typedRecord(words: readonly string[], flowsheet: Flowsheet): string[] {
  const world = worldOf(flowsheet);
  const faults: UsageFault[] = [];
  const texts: string[] = [];
  for (const { text, at, offset } of expressionsOf(words)) {
    const formula = compileFormula(text, formulaRoots);
    if (!formula.ok) {
      const { what, why, mend } = formula;
      const length = Math.max(1, formula.length);
      faults.push({
        code: 'bad-formula',
        what: `--record: ${what}`,
        why,
        mend,
        at,
        offset: offset + formula.offset,
        length,
      });
      continue;
    }
    const wrong = misnamed(formula.names, world);
    if (wrong !== null) {
      const { name, fault } = wrong;
      faults.push({ ...fault, at, offset: offset + name.offset, length: name.length });
    } else if (texts.includes(text)) {
      faults.push({
        code: 'duplicate-name',
        what: `${text} is recorded twice.`,
        why: 'each is a column, and two columns of one name cannot be told apart',
        mend: 'take one of them out',
        at,
        offset,
        length: text.length,
      });
    } else texts.push(text);
  }
  if (faults.length > 0) throw usageRefusals(faults);
  return texts;
}

/** What is recorded where nobody says: the key figures that the flowsheet has, and the user's own. */
export function usualRecord({ ledger, figures }: Flowsheet): string[] {
  return [
    ...(ledger.product === null ? [] : ['figures.production_t_d']),
    ...(ledger.product === null || ledger.reactant === null ? [] : ['figures.overall_yield.value']),
    ...(ledger.recycle === null ? [] : ['figures.recycle_ratio']),
    ...(ledger.purge.length === 0 ? [] : ['figures.purge.fraction_of_makeup']),
    'figures.power_kW.total',
    ...figures.map(({ name }) => `figures.user.${name}`),
  ];
}

/**
 * The details of a block are known from its report only: they are judged at the first case, where that closes.
 *
 * @throws Refusal
 */
export function checkDetails(record: readonly string[], scope: FirstCase['scope']): void {
  if (scope === null) return;
  const named = record.flatMap((text) => {
    const formula = compileFormula(text, formulaRoots);
    const names = formula.ok ? formula.names : [];
    return names.filter(({ parts }) => parts[0] === 'blocks').map((name) => ({ text, name }));
  });
  const faults = named.flatMap(({ text, name }) => faultOf(text, name, scope));
  if (faults.length > 0) throw usageRefusals(faults);
}

function faultOf(
  text: string,
  { parts }: FormulaName,
  scope: Readonly<Record<string, unknown>>,
): UsageFault[] {
  let value: unknown = scope;
  for (const [k, part] of parts.entries()) {
    const known = typeof value === 'object' && value !== null ? Object.keys(value) : [];
    if (!known.includes(part)) {
      const path = parts.slice(0, k).join('.');
      const near = nearestName(part, known);
      return [
        {
          code: 'unknown-figure',
          what: `${parts.join('.')} is not known.`,
          why:
            known.length === 0
              ? `${path} is one value and has no parts`
              : near === null
                ? `${path} has the parts ${known.join(', ')}`
                : `the nearest is ${near}`,
          mend:
            near !== null
              ? `write ${[path, near, ...parts.slice(k + 1)].join('.')}`
              : known.length === 0
                ? `write ${path}`
                : `write ${path}.NAME, NAME one of these`,
          at: text,
        },
      ];
    }
    value = (value as Record<string, unknown>)[part];
  }
  if (typeof value === 'number') return [];
  return [
    {
      code: 'unknown-figure',
      what: `${parts.join('.')} is not one number.`,
      why: 'a column of the table holds numbers',
      mend: 'name a part of it that is a number',
      at: text,
    },
  ];
}
