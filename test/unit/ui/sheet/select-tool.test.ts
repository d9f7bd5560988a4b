// Owns the facts of selecting, moving, resizing and ordering on the sheet.
import { describe, expect, test } from 'vitest';
import { Hand, makeTestJob, mm } from './sheet-fixture.ts';

const INSIDE_ROD = mm(120, 50);
const INSIDE_BOARD = mm(165, 25);
const NOWHERE = mm(30, 80);

describe('selecting', () => {
  test('a click selects what lies under it and a click in the open selects nothing', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_ROD);
    expect(hand.selection).toEqual(['disc-1']);
    hand.click(NOWHERE);
    expect(hand.selection).toEqual([]);
  });

  test('Shift adds to the selection and takes out of it again', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_ROD);
    hand.click(INSIDE_BOARD, { shift: true });
    expect(hand.selection).toEqual(['disc-1', 'rectangle-1']);
    hand.click(INSIDE_ROD, { shift: true });
    expect(hand.selection).toEqual(['rectangle-1']);
  });

  test('a band takes only what lies wholly inside it', () => {
    const hand = new Hand(makeTestJob());
    hand.drag(mm(85, 95), mm(170, 15));
    expect([...hand.selection].sort()).toEqual(['disc-1', 'probe-1', 'probe-2']);
  });

  test('a probe above a part is taken before the part', () => {
    const job = makeTestJob();
    const hand = new Hand({ ...job, probes: [{ id: 'probe-1', name: 'Probe 1', at: ['120 mm', '50 mm'] }] });
    hand.click(INSIDE_ROD);
    expect(hand.selection).toEqual(['probe-1']);
  });

  test('Tab visits drives, parts and probes in order, then leaves the sheet', () => {
    const hand = new Hand(makeTestJob());
    const visited: string[] = [];
    for (let k = 0; k < 6; k++) {
      hand.keys('Tab');
      visited.push(...hand.selection);
    }
    expect(visited).toEqual(['line-current-1', 'wall-1', 'disc-1', 'rectangle-1', 'probe-1', 'probe-2']);
    hand.keys('Tab');
    expect(hand.selection).toEqual([]);
    expect(hand.last?.handled).toBe(false);
  });

  test('Shift Tab from nothing begins with the last thing', () => {
    const hand = new Hand(makeTestJob());
    hand.keys('Shift+Tab');
    expect(hand.selection).toEqual(['probe-2']);
  });

  test('Enter asks for the first dimension of what is selected', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_ROD);
    hand.keys('Enter');
    expect(hand.actions.at(-1)).toEqual({ do: 'open dimension' });
  });
});

describe('moving', () => {
  test('a drag moves by whole steps of the grid under one join key', () => {
    const hand = new Hand(makeTestJob());
    hand.drag(INSIDE_BOARD, mm(165.8, 41));
    expect(hand.job.parts[2]).toMatchObject({ from: ['150 mm', '35 mm'], to: ['180 mm', '45 mm'] });
    const keys = hand.actions.flatMap((action) =>
      action.do === 'edit' && action.policy.kind === 'join' ? [action.policy.key] : [],
    );
    expect(keys.length).toBeGreaterThan(1);
    expect(new Set(keys).size).toBe(1);
  });

  test('two drags have different join keys', () => {
    const hand = new Hand(makeTestJob());
    hand.drag(INSIDE_BOARD, mm(165, 40));
    hand.drag(mm(165, 40), mm(165, 60));
    const keys = hand.actions.flatMap((action) =>
      action.do === 'edit' && action.policy.kind === 'join' ? [action.policy.key] : [],
    );
    expect(new Set(keys).size).toBe(2);
  });

  test('a trembling hand does not move what it clicks', () => {
    const hand = new Hand(makeTestJob());
    hand.press(INSIDE_ROD);
    hand.move(mm(121, 50));
    hand.release(mm(121, 50));
    expect(hand.actions.filter((action) => action.do === 'edit')).toEqual([]);
  });

  test('a dragged corner meets the corner of another part exactly', () => {
    const hand = new Hand(makeTestJob());
    // The board's lower left corner (150, 20) to within 3 px of the wall's upper right corner (62, 40).
    hand.drag(mm(151, 21), mm(151 - 88 + 1.2, 21 + 20 + 0.9));
    expect(hand.job.parts[2]).toMatchObject({ from: ['62 mm', '40 mm'], to: ['92 mm', '50 mm'] });
  });

  test('Alt suspends snapping', () => {
    const hand = new Hand(makeTestJob());
    hand.drag(INSIDE_BOARD, mm(167, 26.5), { alt: true });
    expect(hand.job.parts[2]).toMatchObject({ from: ['152 mm', '21.5 mm'] });
  });

  test('Shift keeps a drag to one axis', () => {
    const hand = new Hand(makeTestJob());
    hand.drag(INSIDE_BOARD, mm(169, 60), { shift: true });
    expect(hand.job.parts[2]).toMatchObject({ from: ['150 mm', '55 mm'] });
  });

  test('Escape during a drag bails out of its join key', () => {
    const hand = new Hand(makeTestJob());
    hand.press(INSIDE_BOARD);
    hand.move(mm(165, 60));
    hand.keys('Escape');
    const edit = hand.actions.find((action) => action.do === 'edit');
    expect(edit?.do === 'edit' && edit.policy.kind === 'join' ? { do: 'bail', key: edit.policy.key } : null).toEqual(
      hand.actions.at(-1),
    );
  });

  test('arrows nudge by the grid step, with Shift by ten', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_ROD);
    hand.keys('ArrowRight', 'Shift+ArrowDown', 'ArrowUp');
    expect(hand.job.parts[1]).toMatchObject({ centre: ['125 mm', '5 mm'] });
  });

  test('a plane wave has no place and is not moved', () => {
    const job = makeTestJob();
    const hand = new Hand({
      ...job,
      drives: [
        {
          id: 'plane-wave-1',
          name: 'Wave',
          kind: 'plane wave',
          amplitude: '1 V/m',
          angle: '0 deg',
          waveform: { kind: 'band pulse' },
        },
      ],
    });
    hand.keys('Tab', 'ArrowRight');
    expect(hand.selection).toEqual(['plane-wave-1']);
    expect(hand.actions.filter((action) => action.do === 'edit')).toEqual([]);
  });
});

describe('editing', () => {
  test('a handle resizes the selected part and keeps what it does not touch', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_BOARD);
    hand.drag(mm(180, 30), mm(190.4, 45.6));
    expect(hand.job.parts[2]).toMatchObject({ from: ['150 mm', '20 mm'], to: ['190 mm', '45 mm'] });
  });

  test('resizing starts from the part as it was pressed, however many moves come', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_BOARD);
    hand.press(mm(180, 30));
    for (const x of [183, 187, 191, 186, 180]) hand.move(mm(x, 30));
    hand.release(mm(180, 30));
    expect(hand.job.parts[2]).toEqual(makeTestJob().parts[2]);
  });

  test('a handle does not stick to the corner it comes from', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_BOARD);
    hand.press(mm(180, 30));
    hand.move(mm(183.2, 30));
    expect(hand.job.parts[2]).toMatchObject({ to: ['185 mm', '30 mm'] });
  });

  test('a radius dragged aslant is still a whole step of the grid', () => {
    const hand = new Hand(makeTestJob());
    hand.job = { ...hand.job, parts: hand.job.parts.map((part) => (part.kind === 'disc' ? { ...part, radius: '10 mm' } : part)) };
    hand.click(INSIDE_ROD);
    hand.drag(mm(130, 50), mm(134, 59));
    expect(hand.job.parts[1]).toMatchObject({ centre: ['120 mm', '50 mm'], radius: '20 mm' });
  });

  test('Delete removes what is selected', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_ROD);
    hand.keys('Delete');
    expect(hand.job.parts.map((part) => part.id)).toEqual(['wall-1', 'rectangle-1']);
    expect(hand.selection).toEqual([]);
  });

  test('Ctrl D sets a copy aside and asks for it to be selected', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_ROD);
    hand.keys('Ctrl+d');
    expect(hand.job.parts).toHaveLength(4);
    expect(hand.job.parts.find((part) => part.kind === 'disc' && part.id !== 'disc-1')).toMatchObject({
      centre: ['130 mm', '40 mm'],
      radius: 'a/2',
    });
    expect(hand.actions.at(-1)).toEqual({ do: 'select new' });
  });

  test('brackets change the painting order and stop at its ends', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_ROD);
    hand.keys(']', ']');
    expect(hand.job.parts.map((part) => part.id)).toEqual(['wall-1', 'rectangle-1', 'disc-1']);
    hand.keys('[', '[', '[');
    expect(hand.job.parts.map((part) => part.id)).toEqual(['disc-1', 'wall-1', 'rectangle-1']);
  });

  test('Ctrl Z is left to the page', () => {
    const hand = new Hand(makeTestJob());
    hand.click(INSIDE_ROD);
    hand.keys('Ctrl+z');
    expect(hand.last?.handled).toBe(false);
  });
});
