import type { Place } from '../model/place.ts';
import type { Findings } from './findings.ts';

/** What a feed, block, reaction, component or stream of the user may be called. */
export const NAME = /^[A-Za-z][A-Za-z0-9_]*$/;

/** Check the name of a part; `noun` is what it names. True where it can be used. */
export function checkName(findings: Findings, name: string, where: Place, noun: string): boolean {
  if (name === 'out') {
    const why = 'out is the battery limit in streams';
    findings.error(where, {
      code: 'reserved-name',
      what: `${noun} cannot be called out.`,
      why,
      mend: 'choose another name',
    });
    return false;
  }
  if (name === 'constructor' || name === 'prototype') {
    const why = `every object in JavaScript has a part called ${name}, so no formula may name one`;
    findings.error(where, {
      code: 'reserved-name',
      what: `${noun} cannot be called ${name}.`,
      why,
      mend: 'choose another name',
    });
    return false;
  }
  if (NAME.test(name)) return true;
  const tidy = name.replace(/[^A-Za-z0-9_]+/g, '_').replace(/^[^A-Za-z]+|_+$/g, '');
  findings.error(where, {
    code: 'bad-name',
    what: `${noun} cannot be called "${name}".`,
    why: 'a name begins with a letter and has letters, digits and _ only, so that paths and formulas can use it',
    mend: tidy === '' ? 'choose another name' : `write e.g. ${tidy}`,
  });
  return false;
}
