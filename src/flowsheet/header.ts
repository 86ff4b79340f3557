import type { Flowsheet } from '../model/flowsheet.ts';
import type { Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import { headerShape } from './schema.ts';
import { child, placeOfPath } from './yaml-tree.ts';

export interface ReadHeader {
  readonly values: Pick<Flowsheet, 'title' | 'notes' | 'gas' | 'liquid' | 'dissolvedGases'>;
  readonly assumptions: readonly string[];
}

/** Version, title and the choice of property models. Null where it is at fault. */
export function readHeader(reading: Reading): ReadHeader | null {
  const { root, findings } = reading;
  const before = findings.list.length;
  const version = child(root, 'looptally');
  if (version?.kind === 'scalar' && typeof version.value === 'number' && version.value !== 1) {
    findings.error(version.place, {
      code: 'wrong-version',
      what: `the file is written for version ${version.text} of the format.`,
      why: 'this program reads version 1',
      mend: version.value > 1 ? 'use a newer Looptally' : 'write looptally: 1',
    });
  } else checkPart(reading, headerShape.looptally, ['looptally']);
  const title = checkPart(reading, headerShape.title, ['title']);
  const notes = checkPart(reading, headerShape.notes, ['notes']);
  const gas = checkPart(reading, headerShape.gas, ['gas']);
  const liquid = checkPart(reading, headerShape.liquid, ['liquid']);
  const dissolved = checkPart(reading, headerShape.dissolved_gases, ['dissolved_gases']);
  if (liquid === 'eos' && gas === 'ideal') {
    findings.error(placeOfPath(root, ['liquid']), {
      code: 'liquid-without-equation',
      what: 'liquid: eos has no equation of state to condense by.',
      why: 'gas: ideal is given, and an ideal gas never condenses',
      mend: 'write gas: srk (or pr), or liquid: antoine',
    });
  }
  if (findings.list.length > before) return null;
  return {
    values: {
      title: title ?? '',
      notes: notes ?? '',
      gas: gas ?? 'srk',
      liquid: liquid ?? 'antoine',
      dissolvedGases: dissolved ?? true,
    },
    assumptions: [
      ...(gas === undefined
        ? ['The vapour is modelled by Soave-Redlich-Kwong (gas: srk), for no model is named.']
        : []),
      ...(dissolved === undefined
        ? ['Gases dissolve in the condensate (dissolved_gases: true), for nothing else is said.']
        : []),
    ],
  };
}
