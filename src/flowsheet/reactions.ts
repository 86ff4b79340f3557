import { isPublishedFault, matchPublished } from '../chemistry/published-constants.ts';
import { parseReaction } from '../chemistry/reaction-text.ts';
import { nearest } from '../diagnostics/nearest.ts';
import type { Component } from '../model/component.ts';
import type { ConstantSource, Reaction } from '../model/reaction.ts';
import { STANDARD_PRESSURE_PA } from '../properties/constants.ts';
import { compileFormula } from '../units/formula.ts';
import type { Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import { reactionSchema } from './schema.ts';
import { optionalEntries } from './section.ts';
import { lowerArticle } from './wording.ts';
import { keyPlaceOfPath, nodeAt, type Path, placeInside, placeOfPath, type YamlScalar } from './yaml-tree.ts';

/** Blanks are welcome, dots are not: paths of settings go through this name. */
const REACTION_NAME = /^[A-Za-z][A-Za-z0-9_ -]*$/;

export interface ReadReactions {
  readonly reactions: readonly Reaction[];
  /** names that stand in the file but could not be read */
  readonly failed: ReadonlySet<string>;
}

/**
 * The reactions: each an equation, or a mapping of an equation with a published constant or an own lnK(T).
 *
 * @param failedIds  components that are declared but could not be read; reactions between them are not judged
 */
export function readReactions(
  reading: Reading,
  components: readonly Component[] | null,
  failedIds: ReadonlySet<string>,
): ReadReactions {
  const { findings } = reading;
  const reactions: Reaction[] = [];
  const failed = new Set<string>();
  for (const { key, keyPlace, value } of optionalEntries(
    reading,
    'reactions',
    'reactions: {synthesis: N2 + 3 H2 <=> 2 NH3}',
  )) {
    if (!REACTION_NAME.test(key)) {
      findings.error(keyPlace, {
        code: 'bad-name',
        what: `a reaction cannot be called "${key}".`,
        why: 'its name begins with a letter and has letters, digits, blanks, - and _ only, so that paths can use it',
        mend: 'choose another name',
      });
    }
    const path: Path = ['reactions', key];
    const reaction =
      value.kind === 'scalar'
        ? readEquation(reading, key, path, value, components, failedIds)
        : readMapping(reading, key, path, components, failedIds);
    if (reaction === null) failed.add(key);
    else reactions.push(reaction);
  }
  return { reactions, failed };
}

function readMapping(
  reading: Reading,
  name: string,
  path: Path,
  components: readonly Component[] | null,
  failedIds: ReadonlySet<string>,
): Reaction | null {
  const entry = checkPart(reading, reactionSchema, path);
  if (entry === undefined) {
    // All that is wrong is told at once: the equation and the formula are read for their faults alone.
    const [equation, lnK] = ['equation', 'lnK'].map((key) => nodeAt(reading.root, [...path, key]));
    if (equation?.kind === 'scalar') readEquation(reading, name, path, equation, components, failedIds);
    if (lnK?.kind === 'scalar') readConstant(reading, path, { lnK: lnK.text });
    return null;
  }
  const equation = nodeAt(reading.root, [...path, 'equation']) as YamlScalar;
  const reaction = readEquation(reading, name, path, equation, components, failedIds);
  const constant = readConstant(reading, path, entry);
  if (reaction === null || constant === null || components === null) return null;
  if (constant.kind !== 'published') return { ...reaction, constant };
  const stoichiometry = Object.fromEntries(components.map((c, i) => [c.id, reaction.coefficients[i]]));
  const match = matchPublished(constant.name, stoichiometry);
  if (!isPublishedFault(match)) return { ...reaction, constant };
  reading.findings.error(placeOfPath(reading.root, [...path, 'constant']), match);
  return null;
}

function readEquation(
  reading: Reading,
  name: string,
  path: Path,
  node: YamlScalar,
  components: readonly Component[] | null,
  failedIds: ReadonlySet<string>,
): Reaction | null {
  if (node.text.trim() === '') {
    reading.findings.error(placeOfPath(reading.root, path), {
      code: 'missing-key',
      what: `the reaction ${name} has no equation.`,
      why: 'nothing stands after the colon',
      mend: 'write it as in N2 + 3 H2 <=> 2 NH3',
    });
    return null;
  }
  if (components === null) return null;
  const parsed = parseReaction(node.text, components);
  if (parsed.ok) {
    return { name, equation: node.text, coefficients: parsed.coefficients, constant: { kind: 'gibbs' } };
  }
  for (const fault of parsed.faults) {
    const word = node.text.slice(fault.offset, fault.offset + fault.length).replace(/^[\d./*\s]+/, '');
    // Said already where the component is declared.
    if (fault.code === 'unknown-component' && (failedIds.has(word) || nearest(word, failedIds) !== null))
      continue;
    const { code, what, why, mend } = fault;
    reading.findings.error(placeInside(node, fault.offset, fault.length), {
      code,
      what: `reaction ${name}: ${lowerArticle(what)}`,
      why,
      mend,
    });
  }
  return null;
}

function readConstant(
  reading: Reading,
  path: Path,
  entry: {
    readonly constant?: string | undefined;
    readonly lnK?: string | undefined;
    readonly standard_pressure?: number | undefined;
  },
): ConstantSource | null {
  const { root, findings } = reading;
  const { constant, lnK, standard_pressure } = entry;
  if (constant !== undefined && lnK !== undefined) {
    const what = `the reaction ${path.at(-1)} has both a published constant and an lnK.`;
    const fault = {
      code: 'too-many-settings',
      what,
      why: 'only one of them can count',
      mend: 'take one of them out',
    };
    findings.error(
      keyPlaceOfPath(root, [...path, 'lnK']),
      fault,
      keyPlaceOfPath(root, [...path, 'constant']),
    );
    return null;
  }
  if (standard_pressure !== undefined && lnK === undefined) {
    findings.error(keyPlaceOfPath(root, [...path, 'standard_pressure']), {
      code: 'unused-key',
      what: `the standard pressure of the reaction ${path.at(-1)} has no use.`,
      why: 'it belongs to an lnK of your own; a published constant brings its own with it',
      mend: 'take standard_pressure out, or write lnK: FORMULA beside it',
    });
    return null;
  }
  if (constant !== undefined) return { kind: 'published', name: constant };
  if (lnK === undefined) return { kind: 'gibbs' };
  const compiled = compileFormula(lnK, ['T']);
  if (!compiled.ok) {
    const node = nodeAt(root, [...path, 'lnK']) as YamlScalar;
    const { what, why, mend, offset, length } = compiled;
    findings.error(placeInside(node, offset, length), {
      code: 'bad-formula',
      what: `reaction ${path.at(-1)}: ${what}`,
      why,
      mend: lnKExample(mend),
    });
    return null;
  }
  const scope = { T: 0 };
  const { evaluate } = compiled;
  return {
    kind: 'formula',
    text: lnK,
    lnK: (temperatureK) => {
      scope.T = temperatureK;
      return evaluate(scope);
    },
    standardPressurePa: standard_pressure ?? STANDARD_PRESSURE_PA,
  };
}

/** The formula of a constant knows T alone: an example with streams would mislead. */
function lnKExample(mend: string): string {
  return mend.includes('streams.') ? 'write it in T [K], as in 4577.8/T - 4.33' : mend;
}
