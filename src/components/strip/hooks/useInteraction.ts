import { useEffect, useLayoutEffect, useReducer, type Dispatch } from 'react';
import {
  interact,
  NOTHING_MARKED,
  type Interaction,
  type InteractionEvent,
  type InteractionGrid,
} from '../model/interaction';
import { formatSelection, parseSelection, type Selection } from '../model/selection';

const KEY = 'selection';

/** Cursor and selection, the selection kept in the address so that it can be sent to a colleague. */
export function useInteraction(grid: InteractionGrid): [Interaction, Dispatch<InteractionEvent>] {
  const [state, dispatch] = useReducer(
    (before: Interaction, event: InteractionEvent) => interact(before, event, grid),
    NOTHING_MARKED,
  );

  // Before anything is shown: only the browser knows what stands behind the `#`.
  useLayoutEffect(() => {
    const follow = () => dispatch({ type: 'select', selection: selectionOfAddress() });
    follow();
    window.addEventListener('hashchange', follow);
    return () => window.removeEventListener('hashchange', follow);
  }, []);

  const isSettled = state.anchor === null;
  useEffect(() => {
    if (isSettled) history.replaceState(history.state, '', addressWith(state.selection));
  }, [isSettled, state.selection]);

  return [state, dispatch];
}

function selectionOfAddress(): Selection | null {
  const text = new URLSearchParams(location.hash.slice(1)).get(KEY);
  return text === null ? null : parseSelection(text);
}

/** The page's address with a selection behind the `#`; other things that stand there stay. */
export function addressWith(selection: Selection | null): string {
  const held = location.hash.slice(1);
  const isOurs = held === '' || held.startsWith(`${KEY}=`);
  const rest = isOurs ? '' : held;
  const fragment = selection ? `${KEY}=${formatSelection(selection)}` : rest;
  return `${location.pathname}${location.search}${fragment ? `#${fragment}` : ''}`;
}
