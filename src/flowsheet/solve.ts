import { nearest } from '../diagnostics/nearest.ts';
import type { SolveSpec, StreamSpec } from '../model/flowsheet.ts';
import type { Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import { streamsInLoops } from './loops.ts';
import { solveSchema } from './schema-studies.ts';
import { child, nodeAt, type Path, placeOfPath, scalarsOf } from './yaml-tree.ts';

/** How the loops are closed, defaults filled in. Null where it is at fault. */
export function readSolve(reading: Reading, streams: readonly StreamSpec[] | null): SolveSpec | null {
  const written = child(reading.root, 'solve');
  const entry = written === undefined ? {} : checkPart(reading, solveSchema, ['solve']);
  const tearNode = nodeAt(reading.root, ['solve', 'tear']);
  const tags = tearNode === undefined ? [] : [...scalarsOf(tearNode)].map((node) => node.text);
  if (streams !== null && tags.length > 0) {
    const inLoops = streamsInLoops(streams);
    for (const [i, tag] of tags.entries()) {
      const path = tearNode?.kind === 'list' ? ['solve', 'tear', i] : ['solve', 'tear'];
      checkTear(reading, tag, path, streams, inLoops);
    }
  }
  if (entry === undefined) return null;
  return {
    method: entry.method ?? 'auto',
    tolerance: entry.tolerance ?? 1e-9,
    maxPasses: entry.max_passes ?? 200,
    tear: entry.tear ?? [],
  };
}

function checkTear(
  { root, findings }: Reading,
  tag: string,
  path: Path,
  streams: readonly StreamSpec[],
  inLoops: ReadonlySet<string>,
): void {
  const where = placeOfPath(root, path);
  const stream = streams.find((s) => s.tag === tag);
  if (stream === undefined) {
    const tags = streams.map((s) => s.tag);
    const near = nearest(tag, tags);
    const why = near === null ? `the streams are ${tags.join(', ')}` : `the nearest stream is ${near}`;
    const mend = near === null ? 'write the tag of a stream' : `write ${near}`;
    findings.error(where, {
      code: 'unknown-stream',
      what: `solve.tear: there is no stream ${tag}.`,
      why,
      mend,
    });
  } else if (stream.to === null) {
    const why = 'only a stream inside a loop can be torn';
    findings.error(where, {
      code: 'bad-tear',
      what: `solve.tear: ${tag} leaves the plant.`,
      why,
      mend: 'take it out, or name a stream of the loop',
    });
  } else if (!inLoops.has(tag)) {
    const why = 'nothing that flows through it comes back to it, so there is nothing to guess';
    const known = [...inLoops].slice(0, 12).join(', ');
    findings.error(where, {
      code: 'bad-tear',
      what: `solve.tear: ${tag} lies in no loop.`,
      why: known === '' ? 'there is no loop in this flowsheet' : why,
      mend:
        known === ''
          ? 'take it out'
          : `take it out, or name a stream of a loop: ${known}${inLoops.size > 12 ? ', ...' : ''}`,
    });
  }
}
