import type { Place } from '../model/place.ts';
import { child, type Path, placeOfPath, type YamlNode } from './yaml-tree.ts';

/**
 * Finds the place of any part by its dotted path: `blocks.condenser.temperature` and `streams.S2`, or the path
 * of a setting, `condenser.temperature`. A path that leads nowhere gives the nearest enclosing part. Names with
 * dots or blanks in them (cases, aims) are found too.
 */
export function createPlaceOf(root: YamlNode): (path: string) => Place {
  return (path) => {
    const parts = path.split('.');
    const section = ['blocks', 'feeds'].find((s) => child(child(root, s), parts[0]) !== undefined);
    const whole = section === undefined ? parts : [section, ...parts];
    return placeOfPath(root, joinKnown(root, whole));
  };
}

/** Join neighbouring parts where only together they are a key: a case named `condenser at 0.5 bar`. */
function joinKnown(root: YamlNode, parts: readonly string[]): Path {
  const path: string[] = [];
  let node: YamlNode | undefined = root;
  for (let i = 0; i < parts.length; ) {
    let end = i + 1;
    while (end < parts.length && child(node, parts.slice(i, end).join('.')) === undefined) end++;
    const key: string = parts.slice(i, end).join('.');
    const next: YamlNode | undefined = child(node, key);
    if (next === undefined) break;
    path.push(key);
    node = next;
    i = end;
  }
  return path;
}
