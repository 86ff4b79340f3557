import { expect, test } from 'vitest';
import { chosenHandles } from '../../src/flowsheet/chosen-handles.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import { fragmentOf, movesOf } from '../../src/live/moves.ts';
import { savedFile } from '../../src/live/saved-file.ts';
import { createLiveSolver } from '../../src/live/solver.ts';
import { handlesOf, standing } from '../../src/sheets/page/live-data.ts';
import { figureLeaves } from '../../src/tally/figure-leaves.ts';
import { shippedText } from '../tally/shipped.ts';

const ammonia = shippedText('ammonia-loop.yaml');
const data = { file: 'loop.yaml', text: ammonia, case: null, set: [] };

async function saved(
  of: typeof data | (Omit<typeof data, 'case' | 'set'> & { case: string | null; set: string[] }),
  moves: [string, string][],
) {
  const outcome = await createLiveSolver(of).exact(new Map(moves));
  if (outcome.kind === 'refused') throw new Error(outcome.diagnostics[0]!.what);
  const handles = handlesOf(outcome.flowsheet);
  const file = savedFile(of, new Map(moves), handles, standing(outcome.flowsheet, handles));
  if ('missing' in file) return { file, outcome, again: null };
  const again = await readFlowsheet(file.text, { file: 'saved.yaml' });
  expect(again.diagnostics).toEqual([]);
  return { file, outcome, again: again.flowsheet };
}

test('a saved file is the original with its values replaced, comments and all', async () => {
  const { file } = await saved(data, [
    ['condenser.temperature', '-12.5 degC'],
    ['purge.fractions.bleed', '3 %'],
  ]);
  const text = 'text' in file ? file.text : '';
  const [, path, more, ...rest] = text.split('\n');
  expect([path, more]).toEqual(['#   condenser.temperature: -12.5 degC', '#   purge.fractions.bleed: 3 %']);
  expect(rest.join('\n')).toBe(
    ammonia
      .replace('    temperature: -8 degC\n', '    temperature: -12.5 degC\n')
      .replace('fractions: {bleed: 2.2 %}', 'fractions: {bleed: 3 %}'),
  );
});

test('a handle that a value has left is widened, for the file would be refused otherwise', async () => {
  const { file, again } = await saved(data, [['condenser.temperature', '-40 degC']]);
  expect('text' in file && file.text).toContain(
    'condenser.temperature: -40 degC..15 degC:91      # a slider',
  );
  expect(again!.handles[0]!.between[0]).toBeCloseTo(233.15, 9);
});

test('the case and the changes that a page was made with are written into the file', async () => {
  const made = { ...data, case: 'cold condenser', set: ['purge.fractions.bleed=4 %'] };
  const { file, again } = await saved(made, [['preheat.temperature', '300 degC']]);
  expect('text' in file && file.text.split('\n').slice(1, 4)).toEqual([
    '#   condenser.temperature: -25 degC',
    '#   purge.fractions.bleed: 4 %',
    '#   preheat.temperature: 300 degC',
  ]);
  const at = standing(again!, handlesOf(again!));
  expect(at.get('condenser.temperature')).toBeCloseTo(248.15, 9);
  expect(at.get('purge.fractions.bleed')).toBeCloseTo(0.04, 12);
});

test('a setting that has no value in the file is named instead of being lost', async () => {
  const made = { ...data, set: ['condenser.condense=NH3'] };
  const handles = chosenHandles((await readFlowsheet(ammonia, { file: 'a' })).flowsheet!);
  expect(savedFile(made, new Map(), handles, new Map())).toEqual({ missing: 'condenser.condense' });
});

test('carriage returns, a byte order mark and quotes do not move the places of values', async () => {
  const odd = `\ufeff${ammonia.replace('temperature: -8 degC', "temperature: '-8 degC'").replaceAll('\n', '\r\n')}`;
  const { file, again } = await saved({ ...data, text: odd }, [['condenser.temperature', '-12.5 degC']]);
  expect('text' in file && file.text).toContain('    temperature: -12.5 degC\r\n    pressure_drop: 4 bar');
  expect(standing(again!, handlesOf(again!)).get('condenser.temperature')).toBeCloseTo(260.65, 9);
});

test('a link holds any move, and what is none is handed back', () => {
  const moves = new Map([
    ['condenser.temperature', '-10 degC'],
    ['makeup.flow', '5 000 Nm³/h & more = %'],
  ]);
  expect(movesOf(fragmentOf(moves))).toEqual({ moves, strangers: [] });
  expect(movesOf('condenser.temperature=-10 degC')).toEqual({
    moves: new Map([['condenser.temperature', '-10 degC']]),
    strangers: [],
  });
  expect(movesOf('sheet&=1&a=&b=%zz')).toEqual({
    moves: new Map(),
    strangers: ['sheet', '=1', 'a=', 'b=%zz'],
  });
});

test.each(['ammonia-loop.yaml', 'ammonia-heat-recovery.yaml', 'methanol-loop.yaml'])(
  'while a setting of %s is on the move its figures are those of the loop closed from its feeds',
  async (name) => {
    const text = shippedText(name);
    const solver = createLiveSolver({ file: name, text, case: null, set: [] });
    const first = await solver.exact(new Map());
    if (first.kind !== 'closed') throw new Error('not closed');
    const handles = handlesOf(first.flowsheet);
    const at = standing(first.flowsheet, handles);
    const { path, between, unit, scale } = handles[0]!;
    for (const share of [0.3, 0.35, 0.7]) at.set(path, between[0] + share * (between[1] - between[0]));
    const quick = solver.quick(at);
    const number = at.get(path)! / scale.factor - scale.offset;
    const exact = await createLiveSolver({ file: name, text, case: null, set: [] }).exact(
      new Map([[path, `${number} ${unit}`]]),
    );
    if (exact.kind !== 'closed') throw new Error('not closed');
    const wanted = figureLeaves(exact.result.figures);
    const found = figureLeaves(quick!.figures);
    expect([...found.keys()]).toEqual([...wanted.keys()]);
    for (const [figure, value] of wanted)
      expect(Math.abs(found.get(figure)! - value), figure).toBeLessThanOrEqual(1e-8 * Math.abs(value) + 1e-9);
  },
);
