import { methods } from '../../src/convergence/methods.ts';
import { chooseTears } from '../../src/graph/tear-set.ts';
import type { MethodName } from '../../src/model/flowsheet.ts';
import { evaluationsNeeded } from '../convergence/evaluations.ts';
import { fourFlashProblem, fourFlashStart } from '../convergence/four-flash.ts';
import { bank } from '../convergence/problem-bank.ts';
import type { Row } from './deviations-row.ts';
import { difference, table } from './deviations-statistics.ts';
import { processGraphs } from './process-graphs.ts';

/**
 * Evaluations that direct substitution needs on the four-flash recycle, recycles empty at the start, to a relative
 * 1e-6; derived independently with the same K values.
 */
const FOUR_FLASH_DIRECT = 210;

/** Evaluations of G by each method on recycle problems with known answers, beside those derived independently. */
export function convergenceCounts(): string {
  const names = Object.keys(methods) as MethodName[];
  const problems = [
    ...bank.map(({ name, problem, start, evaluations }) => ({
      name,
      problem,
      start,
      within: 1e-8,
      derived: evaluations,
    })),
    {
      name: 'four-flash recycle, two tears of 16 components, to 1e-6',
      within: 1e-6,
      problem: fourFlashProblem(),
      start: fourFlashStart,
      derived: { direct: FOUR_FLASH_DIRECT } as Readonly<Partial<Record<MethodName, number | null>>>,
    },
  ];
  return [
    '**Passes to close recycles with known answers.** Evaluations of G until the largest |G − x|/max(1, |G|) is 1e-8, by the ' +
      'method alone; in brackets those derived independently for the method in its plain form (Wegstein without bounds, ' +
      'Anderson with 5 passes remembered; ours is bounded and remembers 8). `-`: it does not get there in 5,000. No published ' +
      'counts of these methods on named loops were found. The four-flash recycle: Cavett, Proc. Am. Petrol. Inst. 43 (1963) ' +
      '57, data from memory.',
    table(
      ['problem', ...names],
      problems.map(({ name, problem, start, within, derived }) => [
        name,
        ...names.map((method) => {
          const ours = count(evaluationsNeeded(problem, start, method, within));
          const other = derived[method];
          return other === undefined ? ours : `${ours} (${count(other)})`;
        }),
      ]),
      [0],
    ),
  ].join('\n\n');
}

function count(evaluations: number | null): string {
  return evaluations === null || !Number.isFinite(evaluations) ? '-' : String(evaluations);
}

/** Torn streams of published process graphs against the published smallest number. */
export function tearRow(): Row {
  return {
    what: `smallest number of torn streams: process graphs of ${spread((graph) => graph.nodes)} blocks and ${spread((graph) => graph.edges)} streams`,
    source: 'Gundersen & Hertzberg, Modeling Identification Control 4(3) (1983) 139',
    unit: 'streams',
    deviations: processGraphs.map((graph) => {
      const pairs = Object.entries(graph.feeds).flatMap(([node, fed]) =>
        fed.map((next) => [Number(node), next] as const),
      );
      const n = Math.max(...pairs.flat()) + 1;
      const from = Int32Array.from(pairs, ([node]) => node);
      const to = Int32Array.from(pairs, ([, next]) => next);
      return difference(graph.name, chooseTears(n, from, to).edges.length, graph.tears);
    }),
    remark: 'every set proven smallest',
  };
}

function spread(of: (graph: (typeof processGraphs)[number]) => number): string {
  const all = processGraphs.map(of);
  return `${Math.min(...all)} to ${Math.max(...all)}`;
}
