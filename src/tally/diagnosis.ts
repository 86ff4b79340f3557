import type { BlockReport } from '../blocks/block.ts';
import { quietReport } from '../blocks/report.ts';
import type { Diagnostic, PassTrouble } from '../diagnostics/diagnostic.ts';
import { type CloseOptions, closePlant, type PlantClosure } from './close-plant.ts';
import type { Plant } from './plant.ts';
import { answerText, type Finding, type Recogniser, wayText } from './why.ts';
import { nothingCondenses } from './why-dry.ts';
import { noRealExit, overfullExit, smallPurge } from './why-exit.ts';
import { DIRECT_PASSES, type Facts, gatherFacts } from './why-facts.ts';
import { flippingPhases } from './why-flip.ts';
import { tooFewPasses, trendOnly, undetermined } from './why-passes.ts';
import { reactorAtBound, reactorBoundFinding, reactorGoneOut } from './why-reactor.ts';
import { isOfUse, tryOut } from './why-trial.ts';

/** Reasons that lie in the flowsheet, in order of certainty: the first whose facts hold is told. */
const ofTheFlowsheet: readonly Recogniser[] = [
  nothingCondenses,
  overfullExit,
  noRealExit,
  flippingPhases,
  smallPurge,
  reactorGoneOut,
];
/** Reasons that lie in the way it was to be closed come after those. */
const recognisers: readonly Recogniser[] = [undetermined, ...ofTheFlowsheet, tooFewPasses];

/**
 * Say why a plant did not close: the block that cannot be evaluated, or what is true of the loop as the last pass left
 * it. Trials with other settings and methods are made for the advice, on plants of their own.
 */
export function diagnose(plant: Plant, closure: PlantClosure, options: CloseOptions): Diagnostic {
  const failure = closure.failure;
  if (!failure) throw new Error('a plant that did not close names the group that failed');
  const { trouble } = failure;
  const before = faultBefore(plant, failure.group);
  if (before !== undefined) return before;
  if (trouble) {
    // Before anything else passes through the plant: the blocks still stand where the pass failed.
    const told = troubleDiagnostic(plant, trouble, failure.group);
    return guessOrBlock(plant, closure, options, told);
  }
  if (!failure.closure) throw new Error('a group without trouble has a closure');
  const facts = gatherFacts(plant, failure.group, failure.closure, failure.names, closure.passes, options);
  const finding = firstOf(recognisers, facts) ?? trendOnly(facts);
  return diagnosticOf(finding, closure, facts);
}

/** What a block ahead of a group holds back, whose streams are settled: that is the cause of whatever fails behind it. */
function faultBefore(plant: Plant, group: Facts['group']): Diagnostic | undefined {
  const ahead = new Set(plant.groups.slice(0, plant.groups.indexOf(group)).flatMap(({ blocks }) => blocks));
  return faultDiagnostics(plant, (b) =>
    ahead.has(b) ? plant.units[b].report(plant.inlets[b], plant.outlets[b]) : quietReport({}),
  )[0];
}

/**
 * A block that failed at a guess of the method, and not on the way that direct substitution takes from the feeds: then
 * what is true of the loop on that way is told, or how it closes.
 *
 * @param told  what the block says
 */
function guessOrBlock(
  plant: Plant,
  closure: PlantClosure,
  options: CloseOptions,
  told: Diagnostic,
): Diagnostic {
  const { group } = closure.failure!;
  if (group.tears.length === 0) return told;
  const why = `${told.why}; ${options.method} came there by a guess`;
  const byDirect = tryOut(plant, group, options.tolerance, [], 'direct');
  if (byDirect !== null && isOfUse(byDirect))
    return { ...told, why, mend: `as it is, the loop closes ${wayText(byDirect, options)} (tried)` };
  const { failure } = closePlant(plant, {
    ...options,
    method: 'direct',
    maxPasses: DIRECT_PASSES,
    warm: false,
  });
  if (!failure?.closure || failure.trouble) return told;
  const facts = gatherFacts(plant, failure.group, failure.closure, failure.names, closure.passes, options);
  const finding = firstOf(ofTheFlowsheet, facts);
  if (finding) return diagnosticOf(finding, closure, facts);
  return facts.answer ? { ...told, why, mend: answerText(facts) } : told;
}

function diagnosticOf(finding: Finding, closure: PlantClosure, facts: Facts): Diagnostic {
  const { directPasses, options } = facts;
  const state = options.method === 'direct' ? '' : `after ${directPasses} direct passes from the feeds, `;
  return {
    code: finding.code,
    severity: 'error',
    where: finding.where ?? facts.plant.flowsheet.placeOf(`streams.${facts.tag}`),
    what: `The recycle through ${facts.tag} did not close in ${closure.passes} passes (${worstText(closure, facts)}): ${finding.what}.`,
    why: finding.isOfDirectPasses ? `${state}${finding.why}` : finding.why,
    mend: finding.mend,
  };
}

function firstOf(list: readonly Recogniser[], facts: Facts): Finding | null {
  for (const recognise of list) {
    const finding = recognise(facts);
    if (finding) return finding;
  }
  return null;
}

function worstText(closure: PlantClosure, { closure: { history }, names }: Facts): string {
  const last = history.findLast(({ residual }) => Number.isFinite(residual));
  const size = `${closure.residual.toExponential(1)} off`;
  return last === undefined ? size : `${names[last.worst]} is ${size}`;
}

/**
 * What keeps the blocks of a plant whose streams have closed from doing what their settings ask for.
 *
 * @param reportOf  what a block says of the last pass; not asked of those that never hold anything back
 */
export function faultDiagnostics(plant: Plant, reportOf: (block: number) => BlockReport): Diagnostic[] {
  return plant.kinds.flatMap((kind, b) => {
    if (!kind.mayHoldBack?.(plant.blocks[b].settings)) return [];
    return reportOf(b).faults.map(({ code, path = [], what, why, mend }) => ({
      code,
      severity: 'error' as const,
      where: plant.flowsheet.placeOf(['blocks', plant.blocks[b].name, ...path].join('.')),
      what: `${plant.blocks[b].name}: ${what}`,
      why,
      mend,
    }));
  });
}

function placeOfTrouble({ block, setting }: PassTrouble): string {
  if (block === null) return '';
  return setting === null ? `blocks.${block}` : `blocks.${block}.${setting}`;
}

function troubleDiagnostic(plant: Plant, trouble: PassTrouble, group: Facts['group']): Diagnostic {
  const where = plant.flowsheet.placeOf(placeOfTrouble(trouble));
  const atBound = reactorAtBound(plant, trouble.code, trouble.block);
  if (atBound) return { severity: 'error', where, ...reactorBoundFinding(plant, group, atBound) };
  return {
    code: trouble.code,
    severity: 'error',
    where,
    what: trouble.block ? `${trouble.block}: ${trouble.message}` : trouble.message,
    why: trouble.why,
    mend: trouble.mend,
  };
}
