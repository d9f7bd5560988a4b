// Owns the facts of drawing new parts and placing probes and line currents.
import { describe, expect, test } from 'vitest';
import type { PartKind } from '../../../../src/model/job.ts';
import { Hand, makeTestJob, mm } from './sheet-fixture.ts';

function draw(part: PartKind): Hand {
  return new Hand(makeTestJob(), { kind: 'draw', part });
}

describe('drawing a wall', () => {
  test('clicks set snapped points and Enter ends with the wall selected and the select tool back', () => {
    const hand = draw('wall');
    hand.click(mm(20.9, 59.2));
    hand.click(mm(41, 60.4));
    hand.keys('Enter');
    const wall = hand.job.parts.at(-1);
    expect(wall).toMatchObject({
      kind: 'wall',
      material: 'perfect-metal',
      points: [
        ['20 mm', '60 mm'],
        ['40 mm', '60 mm'],
      ],
    });
    expect(hand.selection).toEqual([wall?.id]);
    expect(hand.tool).toEqual({ kind: 'select' });
  });

  test('typed length and angle set the next point exactly', () => {
    const hand = draw('wall');
    hand.click(mm(20, 60));
    hand.move(mm(50, 75));
    hand.type('22.86');
    hand.keys('Tab');
    hand.type('-90');
    hand.keys('Enter', 'Enter');
    expect(hand.job.parts.at(-1)).toMatchObject({
      points: [
        ['20 mm', '60 mm'],
        ['20 mm', '37.14 mm'],
      ],
    });
  });

  test('a typed length keeps the direction of the pointer to the whole degree', () => {
    const hand = draw('wall');
    hand.click(mm(20, 60));
    hand.move(mm(70, 60));
    hand.type('0.9 in');
    hand.keys('Enter', 'Enter');
    expect(hand.job.parts.at(-1)).toMatchObject({
      points: [
        ['20 mm', '60 mm'],
        ['42.86 mm', '60 mm'],
      ],
    });
  });

  test('a space belongs to the quantity once typing has begun, and to the page before', () => {
    const hand = draw('wall');
    hand.click(mm(20, 60));
    hand.type(' ');
    expect(hand.last?.handled).toBe(false);
    hand.type('3 ');
    expect(hand.last?.handled).toBe(true);
    expect(hand.last?.typed?.fields[0]?.text).toBe('3 ');
  });

  test('a named value can be typed', () => {
    const hand = draw('wall');
    hand.click(mm(20, 60));
    hand.move(mm(70, 60));
    hand.type('(a*1.5)');
    hand.keys('Enter', 'Enter');
    expect(hand.job.parts.at(-1)).toMatchObject({
      points: [
        ['20 mm', '60 mm'],
        ['50 mm', '60 mm'],
      ],
    });
  });

  test('Shift turns the segment to the nearest 15 degrees', () => {
    const hand = draw('wall');
    hand.click(mm(20, 50));
    hand.click(mm(60, 54), { shift: true });
    hand.keys('Enter');
    expect(hand.job.parts.at(-1)).toMatchObject({
      points: [
        ['20 mm', '50 mm'],
        ['60 mm', '50 mm'],
      ],
    });
  });

  test('a text that does not read is told, and Enter does not take it', () => {
    const hand = draw('wall');
    hand.click(mm(20, 60));
    hand.type('3 kg');
    hand.keys('Enter');
    expect(hand.last?.typed?.problem).toMatch(/kg/);
    expect(hand.job.parts).toHaveLength(3);
  });

  test('Backspace takes typed digits back, then points', () => {
    const hand = draw('wall');
    hand.click(mm(20, 60));
    hand.click(mm(40, 60));
    hand.click(mm(40, 90));
    hand.type('5');
    hand.keys('Backspace', 'Backspace', 'Enter');
    expect(hand.job.parts.at(-1)).toMatchObject({
      points: [
        ['20 mm', '60 mm'],
        ['40 mm', '60 mm'],
      ],
    });
  });

  test('Escape ends a wall that has a segment and drops one that has none', () => {
    const ended = draw('wall');
    ended.click(mm(20, 60));
    ended.click(mm(40, 60));
    ended.keys('Escape');
    expect(ended.job.parts).toHaveLength(4);
    const dropped = draw('wall');
    dropped.click(mm(20, 60));
    dropped.keys('Escape');
    expect(dropped.job.parts).toHaveLength(3);
    expect(dropped.tool).toEqual({ kind: 'select' });
  });

  test('a double click ends the wall without a point twice', () => {
    const hand = draw('wall');
    hand.click(mm(20, 60));
    hand.click(mm(40, 60));
    hand.click(mm(40, 60));
    hand.feed({ kind: 'double', at: mm(40, 60), shift: false, alt: false, ctrl: false });
    expect(hand.job.parts.at(-1)).toMatchObject({
      points: [
        ['20 mm', '60 mm'],
        ['40 mm', '60 mm'],
      ],
    });
  });

  test('typed coordinates, lengths and Enter draw a wall without a pointer', () => {
    const hand = draw('wall');
    hand.type('10');
    hand.keys('Tab');
    hand.type('90');
    hand.keys('Enter');
    hand.type('30');
    hand.keys('Tab');
    hand.type('0');
    hand.keys('Enter', 'Enter');
    expect(hand.job.parts.at(-1)).toMatchObject({
      points: [
        ['10 mm', '90 mm'],
        ['40 mm', '90 mm'],
      ],
    });
  });

  test('arrow keys and Enter draw a wall too', () => {
    const hand = draw('wall');
    hand.keys('Shift+ArrowUp', 'ArrowRight', 'Enter', 'Shift+ArrowRight', 'Enter', 'Enter');
    expect(hand.job.parts.at(-1)).toMatchObject({
      points: [
        ['5 mm', '50 mm'],
        ['55 mm', '50 mm'],
      ],
    });
  });
});

describe('drawing shapes', () => {
  test('a drag makes a rectangle', () => {
    const hand = draw('rectangle');
    hand.drag(mm(10, 60), mm(31, 84));
    expect(hand.job.parts.at(-1)).toMatchObject({ kind: 'rectangle', from: ['10 mm', '60 mm'], to: ['30 mm', '85 mm'] });
  });

  test('two clicks make a rectangle, Shift a square', () => {
    const hand = draw('rectangle');
    hand.click(mm(10, 60));
    hand.click(mm(30, 95), { shift: true });
    expect(hand.job.parts.at(-1)).toMatchObject({ from: ['10 mm', '60 mm'], to: ['45 mm', '95 mm'] });
  });

  test('typed sizes go to the side of the pointer', () => {
    const hand = draw('rectangle');
    hand.click(mm(50, 90));
    hand.move(mm(40, 80));
    hand.type('22.86');
    hand.keys('Tab');
    hand.type('10.16');
    hand.keys('Enter');
    expect(hand.job.parts.at(-1)).toMatchObject({ from: ['50 mm', '90 mm'], to: ['27.14 mm', '79.84 mm'] });
  });

  test('a typed radius stays as it was typed', () => {
    const hand = draw('disc');
    hand.click(mm(20, 60));
    hand.move(mm(30, 60));
    hand.type('(a/3)');
    hand.keys('Enter');
    expect(hand.job.parts.at(-1)).toMatchObject({ kind: 'disc', centre: ['20 mm', '60 mm'], radius: '(a/3)' });
  });

  test('a disc drawn aslant has a radius of whole steps of the grid', () => {
    const hand = draw('disc');
    hand.click(mm(30, 60));
    hand.click(mm(45, 70));
    expect(hand.job.parts.at(-1)).toMatchObject({ kind: 'disc', radius: '20 mm' });
  });

  test('a ring has half its outer radius as inner one unless that is typed', () => {
    const hand = draw('ring');
    hand.click(mm(20, 60));
    hand.click(mm(40, 60));
    expect(hand.job.parts.at(-1)).toMatchObject({ kind: 'ring', inner: '10 mm', outer: '20 mm', from: '0 deg', to: '360 deg' });
  });

  test('an inner radius above the outer one is refused in words', () => {
    const hand = draw('ring');
    hand.click(mm(20, 60));
    hand.type('10');
    hand.keys('Tab');
    hand.type('12');
    expect(hand.last?.typed?.problem).toMatch(/inner radius must be below/);
  });

  test('a polygon closes on its first point', () => {
    const hand = draw('polygon');
    for (const at of [mm(10, 60), mm(30, 60), mm(30, 80), mm(10, 60)]) hand.click(at);
    expect(hand.job.parts.at(-1)).toMatchObject({
      kind: 'polygon',
      points: [
        ['10 mm', '60 mm'],
        ['30 mm', '60 mm'],
        ['30 mm', '80 mm'],
      ],
    });
  });

  test('a stroke follows the hand, is thinned, and takes any paint and a typed width', () => {
    const hand = draw('stroke');
    hand.paint = 'air';
    hand.type('3');
    hand.press(mm(20, 60));
    for (let k = 1; k <= 40; k++) hand.move(mm(20 + k, 60));
    for (let k = 1; k <= 20; k++) hand.move(mm(60, 60 + k));
    hand.release(mm(60, 80));
    expect(hand.job.parts.at(-1)).toMatchObject({
      kind: 'stroke',
      material: 'air',
      width: '3 mm',
      points: [
        ['20 mm', '60 mm'],
        ['60 mm', '60 mm'],
        ['60 mm', '80 mm'],
      ],
    });
  });

  test('what is about to be drawn is previewed as a part', () => {
    const hand = draw('disc');
    hand.click(mm(20, 60));
    const step = hand.move(mm(30, 60));
    expect(step.preview).toMatchObject({ kind: 'part', part: { kind: 'disc', radius: '10 mm' } });
    expect(hand.job.parts).toHaveLength(3);
  });
});

describe('placing', () => {
  test('a probe goes where the pointer snaps', () => {
    const hand = new Hand(makeTestJob(), { kind: 'place', thing: 'probe' });
    hand.move(mm(119, 50.5));
    expect(hand.last?.snap?.words).toBe('centre of Rod');
    hand.press(mm(119, 50.5));
    expect(hand.job.probes.at(-1)).toMatchObject({ name: 'Probe 3', at: ['120 mm', '50 mm'] });
    expect(hand.selection).toEqual([hand.job.probes.at(-1)?.id]);
  });

  test('typed coordinates are kept as typed', () => {
    const hand = new Hand(makeTestJob(), { kind: 'place', thing: 'line current' });
    hand.type('(a+1 mm)');
    hand.keys('Tab');
    hand.type('12,5');
    hand.keys('Enter');
    expect(hand.job.drives.at(-1)).toMatchObject({ kind: 'line current', at: ['(a+1 mm)', '12.5 mm'] });
  });
});
