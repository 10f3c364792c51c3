import { type Band } from '#lib/acoustics/bands';
import { selectionBetween, type Corner } from './dragSelection';
import { type Selection } from './selection';
import { type StripColumns } from './stripColumns';

/** Where the cursor is, what is selected, and what is being selected. */
export interface Interaction {
  cursor: Corner | null;
  /** Fixed corner of a selection that is being made by pointer or keyboard. */
  anchor: Corner | null;
  selection: Selection | null;
  /** Whether the cursor was last moved by keyboard: its readout is then announced. */
  isByKeyboard: boolean;
}

export type InteractionEvent =
  | { type: 'hover'; corner: Corner }
  | { type: 'leave' }
  | { type: 'drag-start'; corner: Corner }
  | { type: 'drag'; corner: Corner }
  | { type: 'drag-end' }
  | { type: 'cursor'; corner: Corner }
  | { type: 'enter' }
  | { type: 'escape' }
  | { type: 'select'; selection: Selection | null };

export interface InteractionGrid {
  /** Selections take whole multiples of this. */
  gridSec: number;
  bands: readonly Band[];
}

/** The grid of strips whose intervals and layers these are; bands are the first one's. */
export function gridOf(
  intervalsSec: readonly number[],
  layers: readonly (readonly StripColumns[])[],
): InteractionGrid {
  const stepsSec = layers.map(([first]) => first?.stepSec ?? 0);
  return { gridSec: Math.max(...intervalsSec, ...stepsSec), bands: layers[0]?.[0]?.bands ?? [] };
}

export const NOTHING_MARKED: Interaction = {
  cursor: null,
  anchor: null,
  selection: null,
  isByKeyboard: false,
};

/** What an event of pointer or keyboard makes of the interaction. */
export function interact(state: Interaction, event: InteractionEvent, grid: InteractionGrid): Interaction {
  switch (event.type) {
    case 'hover':
      return state.anchor ? state : { ...state, cursor: event.corner, isByKeyboard: false };
    case 'leave':
      return state.anchor || state.isByKeyboard ? state : { ...state, cursor: null };
    case 'drag-start':
      return { ...state, cursor: event.corner, anchor: event.corner, isByKeyboard: false };
    case 'drag':
      return state.anchor && !state.isByKeyboard ? stretch({ ...state, cursor: event.corner }, grid) : state;
    case 'drag-end':
      return state.isByKeyboard ? state : { ...state, anchor: null };
    case 'cursor':
      return stretch({ ...state, cursor: event.corner, isByKeyboard: true }, grid);
    case 'enter':
      return enter(state, grid);
    case 'escape':
      return { ...state, anchor: null, selection: null };
    case 'select':
      return { ...state, anchor: null, selection: event.selection };
  }
}

/** Starts a selection at the cursor, or ends the one that is being made. */
function enter(state: Interaction, grid: InteractionGrid): Interaction {
  if (!state.cursor) return state;
  if (state.anchor) return { ...state, anchor: null };
  return stretch({ ...state, anchor: state.cursor, isByKeyboard: true }, grid);
}

function stretch(state: Interaction, { gridSec, bands }: InteractionGrid): Interaction {
  if (!state.anchor || !state.cursor) return state;
  return { ...state, selection: selectionBetween(state.anchor, state.cursor, gridSec, bands) };
}
