import { describe, expect, it } from 'vitest';
import { bandsOf } from '#lib/acoustics/bands';
import {
  interact,
  NOTHING_MARKED,
  type InteractionEvent,
} from '../../../src/components/strip/model/interaction';
import { movedCursor } from '../../../src/components/strip/model/keyboard';

const grid = { gridSec: 60, bands: bandsOf(3) };
const after = (...events: InteractionEvent[]) =>
  events.reduce((state, event) => interact(state, event, grid), NOTHING_MARKED);
const corner = (sec: number, bandAt: number | null = null) => ({ sec, bandAt });

describe('marking with the pointer', () => {
  it('selects between where the drag began and where it ended', () => {
    const state = after(
      { type: 'drag-start', corner: corner(70, 3) },
      { type: 'drag', corner: corner(200, 5) },
      { type: 'drag-end' },
    );
    expect(state).toMatchObject({
      anchor: null,
      selection: { fromSec: 60, toSec: 240, bands: { lowestIndex: -16, highestIndex: -14 } },
    });
  });

  it('keeps the old selection when a press does not move', () => {
    const made = after({ type: 'select', selection: { fromSec: 0, toSec: 60, bands: null } });
    const pressed = [
      { type: 'drag-start', corner: corner(500) } as const,
      { type: 'drag-end' } as const,
    ].reduce((state, event) => interact(state, event, grid), made);
    expect(pressed.selection).toEqual(made.selection);
  });

  it('shows a cursor while hovering and none after leaving', () => {
    expect(after({ type: 'hover', corner: corner(5) }).cursor).toEqual(corner(5));
    expect(after({ type: 'hover', corner: corner(5) }, { type: 'leave' }).cursor).toBeNull();
  });
});

describe('marking with the keyboard', () => {
  it('starts with Enter, stretches with the cursor, ends with Enter', () => {
    const making = after(
      { type: 'cursor', corner: corner(30) },
      { type: 'enter' },
      { type: 'cursor', corner: corner(150) },
    );
    expect(making).toMatchObject({ selection: { fromSec: 0, toSec: 180, bands: null } });
    const done = [{ type: 'enter' } as const, { type: 'cursor', corner: corner(900) } as const].reduce(
      (state, event) => interact(state, event, grid),
      making,
    );
    expect(done).toMatchObject({ anchor: null, selection: { fromSec: 0, toSec: 180 } });
  });

  it('clears with Escape and keeps the cursor when the pointer wanders off', () => {
    const state = after(
      { type: 'cursor', corner: corner(30) },
      { type: 'enter' },
      { type: 'escape' },
      { type: 'leave' },
    );
    expect(state).toMatchObject({ selection: null, anchor: null, cursor: corner(30) });
  });
});

describe('moving the cursor by keys', () => {
  const keyboard = { view: { fromSec: 0, toSec: 86_400 }, stepSec: 60, bandCount: 31, isShift: false };

  it('goes from interval to interval, ten times as far with shift', () => {
    const once = movedCursor(corner(43_230), 'ArrowRight', keyboard);
    const far = movedCursor(corner(43_230), 'ArrowRight', { ...keyboard, isShift: true });
    expect(once?.sec).toBe(43_470);
    expect(far?.sec).toBe(43_230 + 2400);
  });

  it('stays in the view', () => {
    expect(movedCursor(corner(30), 'ArrowLeft', keyboard)?.sec).toBe(30);
    expect(movedCursor(corner(30), 'End', keyboard)?.sec).toBe(86_370);
  });

  it('climbs from the level trace into the bands and back', () => {
    expect(movedCursor(corner(30), 'ArrowUp', keyboard)?.bandAt).toBe(0);
    expect(movedCursor(corner(30, 0), 'ArrowDown', keyboard)?.bandAt).toBeNull();
    expect(movedCursor(corner(30, 30), 'ArrowUp', keyboard)?.bandAt).toBe(30);
  });

  it('leaves other keys alone', () => {
    expect(movedCursor(corner(30), 'a', keyboard)).toBeNull();
  });
});
