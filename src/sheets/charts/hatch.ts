import { QUIET } from './palette.ts';

/** Slanted lines: read without colour, and light enough to read numbers through. */
export function hatchPattern(id: string): string {
  return `<pattern id="${id}-hatch" width="7" height="7" patternUnits="userSpaceOnUse" patternTransform="rotate(45)"><path d="M0 0V7" stroke="${QUIET}" stroke-width="1.3" stroke-opacity="0.55"/></pattern>`;
}
