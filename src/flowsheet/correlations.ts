import { z } from 'zod';
import { nearest } from '../diagnostics/nearest.ts';
import type { Correlation } from '../model/spread.ts';
import { correlationFactor } from './correlation-matrix.ts';
import type { Fault, Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import { correlationSchema } from './schema-studies.ts';
import type { ReadSpreads } from './spreads.ts';
import { child, type Path, placeOfPath } from './yaml-tree.ts';

const listSchema = z.array(correlationSchema);

/** The correlations between spreads: each pair known and given once, all of them possible together. */
export function readCorrelations(reading: Reading, { spreads, paths }: ReadSpreads): readonly Correlation[] {
  const { root, findings } = reading;
  if (child(root, 'correlations') === undefined) return [];
  const list = checkPart(reading, listSchema, ['correlations']);
  if (list === undefined) return [];
  const places = new Map<string, Path>();
  let sound = true;
  const refuse = (path: Path, fault: Fault, also?: Path) => {
    sound = false;
    findings.error(placeOfPath(root, path), fault, also && placeOfPath(root, also));
  };
  for (const [n, { between }] of list.entries()) {
    const at: Path = ['correlations', n, 'between'];
    for (const [i, path] of between.entries()) {
      if (!paths.includes(path)) refuse([...at, i], notSpread(path, paths));
    }
    if (between[0] === between[1]) refuse([...at, 1], withItself(between[0]));
    const pair = between.toSorted().join(' ');
    const before = places.get(pair);
    if (before !== undefined) refuse(at, givenTwice(between), before);
    places.set(pair, at);
  }
  const drawn = spreads.map(({ path }) => path);
  if (!sound || drawn.length < paths.length) return list;
  const made = correlationFactor(drawn, list);
  if (!made.ok) refuse(['correlations', made.pair, 'value'], impossible(list[made.pair]));
  return list;
}

function notSpread(path: string, paths: readonly string[]): Fault {
  const near = nearest(path, paths);
  return {
    code: 'bad-correlation',
    what: `${path} is not spread.`,
    why:
      near === null
        ? `only what stands under spreads can be correlated${paths.length === 0 ? '' : `: ${paths.join(', ')}`}`
        : `the nearest spread is ${near}`,
    mend: near === null ? 'add it to spreads, or take the correlation out' : `write ${near}`,
  };
}

function withItself(path: string): Fault {
  return {
    code: 'bad-correlation',
    what: `${path} is correlated with itself.`,
    why: 'a correlation is between two spreads',
    mend: 'name another spread',
  };
}

function givenTwice([one, other]: readonly [string, string]): Fault {
  return {
    code: 'bad-correlation',
    what: `the correlation between ${one} and ${other} is given twice.`,
    why: 'a pair has one correlation',
    mend: 'take one of them out',
  };
}

function impossible({ between: [one, other], value }: Correlation): Fault {
  return {
    code: 'bad-correlation',
    what: `a correlation of ${value} between ${one} and ${other} cannot hold beside the others.`,
    why: 'the matrix of all correlations is not positive definite: two that both follow a third cannot run apart',
    mend: 'bring it closer to 0, or weaken the others of these two',
  };
}
