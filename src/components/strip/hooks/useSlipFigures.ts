import { useMemo } from 'react';
import { type BandFraction } from '#lib/acoustics/bands';
import { estimateFigures } from '../model/estimate';
import { type Selection } from '../model/selection';
import { figuresOfEstimate, figuresOfStatistics, type SlipFigures } from '../model/slipFigures';
import { type StripColumns } from '../model/stripColumns';
import type { Statistics } from '#lib/contracts/levels';
import type { UsualLevels } from '#lib/contracts/usual';
import { useDebounced } from './useDebounced';
import { useStatistics } from './useStatistics';
import { useUsual } from './useUsual';

/** Time that a view must stand still before the server is asked for its figures. What a person marked is asked for when let go. */
const SETTLE_MS = 150;

interface SlipInput {
  stationUrl: string;
  selection: Selection;
  /** Whether a person has marked it: only then is the usual looked up. */
  isMarked: boolean;
  /** Whether the person has let go of it. */
  isSettled: boolean;
  layers: readonly StripColumns[];
  fraction: BandFraction;
  intervalSec: number;
  nowSec: number;
  /** Figures that came with the page. */
  known: Statistics | undefined;
}

export interface SlipState {
  figures: SlipFigures | null;
  usual: UsualLevels | null;
  error: Error | null;
}

/** Figures of a selection: the estimate from the screen in the same frame, then the server's. */
export function useSlipFigures(input: SlipInput): SlipState {
  const { stationUrl, selection, layers, fraction, intervalSec, nowSec } = input;
  const { fromSec, toSec } = selection;
  const settled = useDebounced(`${fromSec}/${toSec}`, SETTLE_MS);
  const isSettled = input.isSettled && (input.isMarked || settled === `${fromSec}/${toSec}`);
  const statistics = useStatistics(stationUrl, { fromSec, toSec }, isSettled, nowSec, input.known);
  const usual = useUsual(stationUrl, { fromSec, toSec }, isSettled && input.isMarked);
  const estimate = useMemo(
    () => estimateFigures(layers, { fromSec, toSec }, intervalSec, nowSec),
    [layers, fromSec, toSec, intervalSec, nowSec],
  );
  const { data, error } = statistics;
  return useMemo(() => {
    const figures = data ? figuresOfStatistics(data, fraction) : estimate && figuresOfEstimate(estimate);
    return { figures, usual, error };
  }, [data, fraction, estimate, usual, error]);
}
