import { nearest } from '../diagnostics/nearest.ts';
import type { Component } from '../model/component.ts';
import { atomGaps, balancingCoefficients } from './atom-balance.ts';
import { formatCoefficient, formatTerms } from './reaction-format.ts';

export { formatReaction } from './reaction-format.ts';

/** A fault in the text of a reaction; offset and length say where in the text. */
export interface ReactionFault {
  readonly code: 'reaction-syntax' | 'unknown-component' | 'idle-component' | 'unbalanced-reaction';
  readonly what: string;
  readonly why: string;
  readonly mend: string;
  readonly offset: number;
  readonly length: number;
}

export type ParsedReaction =
  | { readonly ok: true; readonly coefficients: Float64Array }
  | { readonly ok: false; readonly faults: readonly ReactionFault[] };

/** One term of an equation: a coefficient, a component id, and where it stands. */
interface Term {
  readonly coefficient: number;
  readonly id: string;
  readonly side: 'left' | 'right';
  readonly offset: number;
  readonly length: number;
  /** where the id stands */
  readonly idOffset: number;
}

const example = 'write it like N2 + 3 H2 <=> 2 NH3';
const arrows = /<=>|<->|<-->|⇌|⇄|→|-->|->|=/g;
const number = String.raw`(?:\d+(?:\.\d*)?|\.\d+)(?:\s*/\s*\d+)?`;
const term = new RegExp(String.raw`^(?:(${number})\s*\*?\s*)?(\p{L}[\p{L}\p{N}_.\-]*)$`, 'u');

/**
 * Read 'N2 + 3 H2 <=> 2 NH3': arrows <=>, <->, =, ->, ⇌; coefficients as integers, decimals or fractions
 * (1/2), with or without a space or '*'. A component on both sides counts by its net coefficient.
 *
 * @returns coefficients in component order, products positive; or every fault found: text that is no
 *   equation, unknown components, components that cancel out, elements that do not balance
 */
export function parseReaction(text: string, components: readonly Component[]): ParsedReaction {
  const split = splitSides(text);
  if ('code' in split) return { ok: false, faults: [split] };
  const faults: ReactionFault[] = [];
  const terms: Term[] = [];
  for (const side of split) {
    for (const piece of termsOf(side)) {
      if ('code' in piece) faults.push(piece);
      else terms.push(piece);
    }
  }
  const ids = components.map((c) => c.id);
  for (const t of terms) if (!ids.includes(t.id)) faults.push(unknownComponent(t, ids));
  if (faults.length > 0) return { ok: false, faults };

  const coefficients = new Float64Array(components.length);
  for (const t of terms) {
    const i = ids.indexOf(t.id);
    coefficients[i] = coefficients[i] + (t.side === 'left' ? -t.coefficient : t.coefficient);
  }
  const idle = terms.filter((t, k) => {
    const first = terms.findIndex((other) => other.id === t.id) === k;
    return first && coefficients[ids.indexOf(t.id)] === 0;
  });
  if (idle.length > 0) return { ok: false, faults: idle.map(idleComponent) };
  const unbalanced = balanceFault(text, asWritten(terms, coefficients, components));
  return unbalanced === null ? { ok: true, coefficients } : { ok: false, faults: [unbalanced] };
}

/** Coefficients by component id, of a text that parseReaction has accepted. */
export function stoichiometryOf(text: string): Record<string, number> {
  const split = splitSides(text);
  if ('code' in split) throw new Error(`not a reaction: ${text}`);
  const sum: Record<string, number> = {};
  for (const piece of split.flatMap(termsOf)) {
    if ('code' in piece) throw new Error(`not a reaction: ${text}`);
    sum[piece.id] = (sum[piece.id] ?? 0) + (piece.side === 'left' ? -piece.coefficient : piece.coefficient);
  }
  return sum;
}

interface Side {
  readonly side: 'left' | 'right';
  readonly text: string;
  readonly offset: number;
}

function splitSides(text: string): readonly [Side, Side] | ReactionFault {
  const found = [...text.matchAll(arrows)];
  if (found.length !== 1) {
    const second = found[1];
    return {
      code: 'reaction-syntax',
      what: `"${text}" is not a reaction.`,
      why: second === undefined ? 'there is no arrow between the two sides' : 'there is more than one arrow',
      mend: example,
      offset: second?.index ?? 0,
      length: second?.[0].length ?? text.length,
    };
  }
  const { index } = found[0];
  const after = index + found[0][0].length;
  return [
    { side: 'left', text: text.slice(0, index), offset: 0 },
    { side: 'right', text: text.slice(after), offset: after },
  ];
}

/** Terms between the plus signs of one side. */
function termsOf(side: Side): (Term | ReactionFault)[] {
  let offset = side.offset;
  return side.text.split('+').map((piece) => {
    const at = offset + (piece.length - piece.trimStart().length);
    offset += piece.length + 1;
    return readTerm(piece.trim(), at, side);
  });
}

function readTerm(text: string, offset: number, side: Side): Term | ReactionFault {
  const match = term.exec(text);
  if (match === null) {
    const empty = text.length === 0;
    return {
      code: 'reaction-syntax',
      what: empty
        ? `The ${side.side} side of the reaction has an empty term.`
        : `"${text}" is not a coefficient and a component.`,
      why: empty
        ? 'a component is missing there'
        : 'a term is a positive number, or none, and a component id',
      mend: example,
      offset: empty ? Math.max(0, offset - 1) : offset,
      length: Math.max(1, text.length),
    };
  }
  const id = match[2];
  const coefficient = match[1] === undefined ? 1 : readNumber(match[1]);
  if (!(coefficient > 0 && Number.isFinite(coefficient))) {
    return {
      code: 'reaction-syntax',
      what: `The coefficient "${match[1]}" of ${id} is not a positive number.`,
      why: 'every component of a reaction takes part with a positive amount on its side',
      mend: `give ${id} a positive coefficient or leave it out`,
      offset,
      length: text.length,
    };
  }
  const length = text.length;
  return { coefficient, id, side: side.side, offset, length, idOffset: offset + length - id.length };
}

function readNumber(text: string): number {
  const [top, bottom] = text.split('/');
  return bottom === undefined ? Number(top) : Number(top) / Number(bottom);
}

function unknownComponent(t: Term, ids: readonly string[]): ReactionFault {
  const near = nearest(t.id, ids);
  return {
    code: 'unknown-component',
    what: `The reaction names the component "${t.id}", which is not in the list of components.`,
    why:
      near === null
        ? `the components are ${ids.join(', ')}`
        : `no component of that name; the nearest one is ${near}`,
    mend:
      near === null
        ? `add ${t.id} to components, or take it out of the reaction`
        : `write ${near}, or add ${t.id} to components`,
    offset: t.idOffset,
    length: t.id.length,
  };
}

function idleComponent(t: Term): ReactionFault {
  return {
    code: 'idle-component',
    what: `${t.id} stands on both sides of the reaction with the same amount.`,
    why: 'it cancels out and takes no part',
    mend: `take ${t.id} out of the reaction; a component that is merely present needs no mention`,
    offset: t.idOffset,
    length: t.id.length,
  };
}

/** The components of a reaction in the order of its text, with their net coefficients. */
function asWritten(
  terms: readonly Term[],
  coefficients: Float64Array,
  components: readonly Component[],
): { component: Component; coefficient: number }[] {
  return [...new Set(terms.map((t) => t.id))].map((id) => {
    const i = components.findIndex((c) => c.id === id);
    return { component: components[i], coefficient: coefficients[i] };
  });
}

function balanceFault(text: string, written: ReturnType<typeof asWritten>): ReactionFault | null {
  const gaps = atomGaps(
    Float64Array.from(written, (w) => w.coefficient),
    written.map((w) => w.component),
  );
  if (gaps.length === 0) return null;
  const offs = gaps.map(({ element, gap }) => {
    const more = gap > 0 ? 'right' : 'left';
    return `${formatCoefficient(Math.abs(gap))} more ${element} on the ${more}`;
  });
  const start = text.length - text.trimStart().length;
  return {
    code: 'unbalanced-reaction',
    what: `The reaction ${text.trim()} does not balance.`,
    why: `it has ${listed(offs)}`,
    mend: balancedText(written),
    offset: start,
    length: Math.max(1, text.trim().length),
  };
}

function balancedText(written: ReturnType<typeof asWritten>): string {
  const left = written.filter((w) => w.coefficient < 0).map((w) => w.component);
  const right = written.filter((w) => w.coefficient > 0).map((w) => w.component);
  const balanced = balancingCoefficients(left, right);
  if (balanced === null) {
    return 'check the components and coefficients: no positive coefficients that balance these sides were found';
  }
  const terms = [
    ...left.map((c, j) => [c.id, -balanced.left[j]] as const),
    ...right.map((c, j) => [c.id, balanced.right[j]] as const),
  ];
  return `write ${formatTerms(Object.fromEntries(terms))}`;
}

function listed(items: readonly string[]): string {
  return items.length < 2 ? items.join('') : `${items.slice(0, -1).join(', ')} and ${items.at(-1)}`;
}
