import { useCallback, useMemo, useRef, useState } from 'react';
import { type BandFraction } from '#lib/acoustics/bands';
import { type PeriodScheme } from '#lib/acoustics/dayEveningNight';
import { stripGeometry } from './draw/geometry';
import { useColumns } from './hooks/useColumns';
import { useElementWidth } from './hooks/useElementWidth';
import { useInteraction } from './hooks/useInteraction';
import { useLiveColumns } from './hooks/useLiveColumns';
import { useNow } from './hooks/useNow';
import { usePicture, type Display } from './hooks/usePicture';
import { useSlipFigures } from './hooks/useSlipFigures';
import { useTheme } from './hooks/useTheme';
import { useTimeView } from './hooks/useTimeView';
import { type StripExceedance } from './model/exceedanceMarks';
import { type StripLimit } from './model/limitLines';
import { readingAt } from './model/reading';
import { type Run } from './model/runs';
import { type Selection } from './model/selection';
import { stripSummary } from './model/summary';
import { clockStretchWords } from './model/timeWords';
import { type TimeView } from './model/timeView';
import { Legend } from './parts/Legend';
import { ReadingSlip } from './parts/ReadingSlip';
import { Readout } from './parts/Readout';
import { SavePicture } from './parts/SavePicture';
import { StripPlot } from './parts/StripPlot';
import { Toolbar } from './parts/Toolbar';

export interface StripProps {
  slug: string;
  station: { code: string; name: string; bandFraction: BandFraction; intervalSec: number };
  /** The page's period. */
  period: TimeView;
  zone: string;
  scheme: PeriodScheme;
  limits: StripLimit[];
  exceedances: StripExceedance[];
  mayExclude: boolean;
  mayLogComplaints: boolean;
}

const NOW_EVERY_SEC = 15;

export function StripView(props: StripProps) {
  const { slug, station, period, zone, scheme, limits, exceedances } = props;
  const stationUrl = `/api/v1/networks/${slug}/stations/${encodeURIComponent(station.code)}`;
  const host = useRef<HTMLDivElement>(null);
  const width = useElementWidth(host);
  const ratio = window.devicePixelRatio;
  const theme = useTheme();
  const nowSec = useNow(NOW_EVERY_SEC);
  const control = useTimeView(period, station.intervalSec, nowSec);
  const [display, setDisplay] = useState<Display>({ weighting: 'Z', fraction: station.bandFraction });
  const geometry = useGeometry(width);
  const isTold = useLiveColumns(slug, station.code, stationUrl);
  const columns = useColumns({
    stationUrl,
    view: control.view,
    intervalSec: station.intervalSec,
    nowSec,
    isTold,
  });
  const gapWords = useCallback((gap: Run) => `no data ${clockStretchWords(gap, zone)}`, [zone]);
  const { layers, weightsCentiDb, picture } = usePicture({
    layers: columns.layers,
    view: control.view,
    geometry,
    ratio,
    theme,
    display,
    zone,
    scheme,
    limits,
    nowSec,
    gapWords,
  });
  const stepSec = layers[0]?.stepSec ?? station.intervalSec;
  const columnSec = layers[0] ? stepSec : null;
  const grid = { gridSec: Math.max(station.intervalSec, stepSec), bands: picture.pixels.bands };
  const [interaction, dispatch] = useInteraction(grid);
  const { fromSec, toSec } = control.view;
  const whole = useMemo(() => wholeView({ fromSec, toSec }), [fromSec, toSec]);
  const selection = interaction.selection ?? whole;
  const slip = useSlipFigures({
    stationUrl,
    selection,
    isMarked: interaction.selection !== null,
    isSettled: interaction.anchor === null,
    layers,
    fraction: display.fraction,
    intervalSec: station.intervalSec,
    nowSec,
  });
  const summary = useMemo(() => stripSummary(station.name, picture), [station.name, picture]);
  const { code } = station;
  const { mayExclude, mayLogComplaints } = props;
  const context = useMemo(
    () => ({ slug, stationCode: code, zone, mayExclude, mayLogComplaints }),
    [slug, code, zone, mayExclude, mayLogComplaints],
  );
  const clear = useCallback(() => dispatch({ type: 'select', selection: null }), [dispatch]);
  const reading = interaction.cursor && readingAt(layers, interaction.cursor, weightsCentiDb);

  return (
    <div className="grid gap-x-6 gap-y-5 desk:grid-cols-[minmax(0,1fr)_18.25rem]">
      <div ref={host} className="min-w-0">
        <div className="mb-2 flex flex-wrap items-center justify-between gap-x-4 gap-y-2">
          <Toolbar
            control={control}
            display={display}
            stationFraction={station.bandFraction}
            onDisplay={setDisplay}
          />
          <p aria-live="polite" className="text-small text-ink-soft">
            {columns.isLoading && 'fetching …'}
          </p>
        </div>
        <Readout
          reading={reading}
          weighting={display.weighting}
          zone={zone}
          isAnnounced={interaction.isByKeyboard}
        />
        {columns.error && (
          <p role="alert" className="my-2 border-l-[3px] border-rust pl-3 text-table">
            {columns.error.message}{' '}
            <button type="button" className="button button-small" onClick={columns.retry}>
              Try again
            </button>
          </p>
        )}
        {width > 0 && (
          <StripPlot
            picture={picture}
            ratio={ratio}
            theme={theme}
            control={control}
            interaction={interaction}
            dispatch={dispatch}
            stepSec={stepSec}
            exceedances={exceedances}
            exceedancesUrl={`/n/${slug}/exceedances`}
            summary={summary}
          />
        )}
        <div className="flex flex-wrap items-center justify-between gap-x-5 gap-y-2">
          <Legend
            range={picture.colouring?.range ?? null}
            weighting={display.weighting}
            theme={theme}
            stepSec={columnSec}
          />
          <SavePicture
            stationCode={code}
            sheet={{
              picture,
              title: `${station.name} (${code})`,
              weighting: display.weighting,
              stepSec: columnSec,
              exceedances,
            }}
            ratio={ratio}
            summary={summary}
          />
        </div>
      </div>
      <ReadingSlip
        selection={selection}
        isMarked={interaction.selection !== null}
        state={slip}
        fraction={display.fraction}
        context={context}
        onClear={clear}
      />
    </div>
  );
}

function wholeView({ fromSec, toSec }: TimeView): Selection {
  return { fromSec: Math.floor(fromSec), toSec: Math.ceil(toSec), bands: null };
}

function useGeometry(width: number) {
  const [geometry, setGeometry] = useState(() => stripGeometry(width));
  if (geometry.width === width) return geometry;
  const next = stripGeometry(width);
  setGeometry(next);
  return next;
}
