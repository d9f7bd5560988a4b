import { expect, test } from 'vitest';
import {
  describeCells,
  describeCost,
  keepUnits,
  writeBytes,
  writeCount,
  writeDuration,
} from '../../../../src/ui/brief/estimate-words.ts';
import { swatchOf, treatmentOf } from '../../../../src/ui/brief/materials.ts';
import { dimensionOfValue } from '../../../../src/ui/brief/NamedValues.tsx';
import { summarisePart } from '../../../../src/ui/brief/PartLine.tsx';
import { writePath } from '../../../../src/ui/brief/path-text.ts';
import { gatherSaid, placeOf } from '../../../../src/ui/brief/remarks.ts';
import { chooseEdge } from '../../../../src/ui/brief/TheSheet.tsx';
import { shortenPoint } from '../../../../src/ui/brief/values.tsx';
import { describeTravel, makeWaveform } from '../../../../src/ui/brief/waveforms.ts';
import { findMaterial } from '../../../../src/model/materials/library.ts';
import { makeSmallJob } from '../../app/small-job.ts';
import { ESTIMATE } from '../../app/fake-solver.ts';

const JOB = makeSmallJob();

test('a path is written as errors write it', () => {
  expect(writePath(['parts', 2, 'points', 0, 1])).toBe('parts[2].points[0][1]');
});

test.each([
  ['parts[0].thickness', 'wall-1'],
  ['probes[0].at', 'probe-1'],
  ['drives[0].angle', 'wave'],
  ['board', 'board'],
  ['grid.cells.x', 'sheet'],
  ['band.to', 'wave'],
  ['stop.after', 'stop'],
  ['values.w', 'values'],
  ['reference', 'read'],
  ['parts[9]', 'parts'],
  [undefined, 'sheet'],
])('what is said of %s stands at %s', (path, place) => {
  expect(placeOf(JOB, path)).toBe(place);
});

test('errors stand before remarks at the same place, each with its weight', () => {
  const said = gatherSaid(
    JOB,
    [{ code: 'thin', message: 'It is thin.', path: 'wall-1' }],
    [{ code: 'bad', message: 'It is bad.', path: 'parts[0]', hint: 'Mend it.' }],
  );
  expect(said.get('wall-1')?.map(({ weight, hint }) => [weight, hint])).toEqual([
    ['error', 'Mend it.'],
    ['remark', null],
  ]);
});

test('a point in one unit names the unit once', () => {
  expect(shortenPoint(['440 mm', '145 mm'])).toEqual({ x: '440', y: '145', unit: ' mm' });
  expect(shortenPoint(['440 mm', '1 in'])).toEqual({ x: '440 mm', y: '1 in', unit: '' });
  expect(shortenPoint(['a/2', '145 mm'])).toEqual({ x: 'a/2', y: '145 mm', unit: '' });
});

test('an edge that repeats takes the opposite one along, there and back', () => {
  const { edges } = JOB.sheet;
  const pair = chooseEdge(edges, 'top', 'repeating');
  expect([pair.top, pair.bottom, pair.left]).toEqual(['repeating', 'repeating', 'absorbing']);
  const back = chooseEdge(pair, 'bottom', 'metal');
  expect([back.top, back.bottom]).toEqual(['metal', 'metal']);
  expect(chooseEdge(edges, 'top', 'metal').bottom).toBe('absorbing');
});

test('a wave along an axis is said to come from a side', () => {
  expect([0, Math.PI / 2, Math.PI, -Math.PI / 2].map(describeTravel)).toEqual([
    'from the left',
    'from below',
    'from the right',
    'from above',
  ]);
  expect(describeTravel(0.3)).toBe('');
});

test('a waveform chosen anew fits the band', () => {
  const band = { fromHertz: 1e9, toHertz: 6e9 };
  expect(makeWaveform('continuous wave', band)).toEqual({ kind: 'continuous wave', frequency: '3.5 GHz' });
  // 0.35 / 6 GHz = 58 ps; two periods of 1 GHz.
  expect(makeWaveform('damped step', band)).toEqual({ kind: 'damped step', rise: '58 ps', decay: '2 ns' });
});

test('a named value is spun as what it is', () => {
  const values = { w: '3 mm', f: '2 GHz', n: '3', bad: '3 mm +' };
  expect(Object.keys(values).map((name) => dimensionOfValue(name, values))).toEqual(['length', 'frequency', 'number', 'length']);
});

test('metal is hatched, air is bare, and denser stuff is tinted more', () => {
  const swatch = (id: string) => swatchOf(findMaterial(JOB, id), 3e9);
  expect(swatch('copper')).toEqual({ kind: 'metal' });
  expect(swatch('air')).toEqual({ kind: 'space' });
  const [ptfe, alumina] = [swatch('ptfe'), swatch('alumina-96')];
  expect(ptfe.kind === 'tint' && alumina.kind === 'tint' && ptfe.strength < alumina.strength).toBe(true);
});

test('a metal of finite conductivity says how it is treated', () => {
  expect(treatmentOf(JOB, 'copper', 3e9)).toContain('perfect metal');
  expect(treatmentOf(JOB, 'no such material', 3e9)).toBe('');
});

test('a folded part still says what it is and how big', () => {
  const [wall] = JOB.parts;
  expect(wall === undefined ? '' : summarisePart(wall)).toBe('wall 2 mm \u00b7 (90 mm, 20 mm) \u00b7 (90 mm, 60 mm)');
});

test('the cost of a run is told in the units of its size', () => {
  expect(describeCells(ESTIMATE)).toBe('180 by 90 cells of 1 mm');
  expect(describeCells({ ...ESTIMATE, dyMetres: 5e-4 })).toBe('180 by 90 cells of 1 mm by 500 \u00b5m');
  expect(describeCost(ESTIMATE)).toContain('23\u202f256 cells with the absorbers, up to 1 MB; a step of 2 ps');
  expect([writeBytes(5120), writeBytes(4.87e6), writeBytes(1.2e9)]).toEqual(['5.1 kB', '4.9 MB', '1.2 GB']);
  expect([0.04, 1.4, 75, 600, 9000].map(writeDuration)).toEqual(['0.1 s', '1 s', '75 s', '10 min', '2.5 h']);
  expect([999, 12848, 1234567].map(writeCount)).toEqual(['999', '12\u202f848', '1\u202f234\u202f567']);
});

test('a number is not parted from its unit', () => {
  expect(keepUnits('depth is 330 nm at 3.4 GHz')).toBe('depth is 330\u00a0nm at 3.4\u00a0GHz');
});
