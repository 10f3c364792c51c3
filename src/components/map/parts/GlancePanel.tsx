import { Fragment, useEffect, useRef } from 'react';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { formatLevelDb } from '#lib/format/levels';
import { formatClock, formatInstant } from '#lib/format/times';
import { urlInstant } from '#lib/time/urlPeriod';
import { HeadroomLines } from '../../headroom/HeadroomLines';
import { Descriptor } from '../../ui/Descriptor';
import { FoldedTable } from '../../ui/FoldedTable';
import { Level } from '../../ui/Level';
import { useLastDay, type LastDay } from '../hooks/useLastDay';
import { type ShownStation } from '../model/shownStation';
import { exceedanceWords, markStateOf, stateLine, stationSentence } from '../model/stationWords';
import { HealthLines } from './HealthLines';
import { Sparkline } from './Sparkline';
import { StateShape } from './StateShape';

const DAY_SEC = 86_400;

interface GlancePanelProps {
  slug: string;
  station: ShownStation;
  zone: string;
  nowSec: number;
  onClose: () => void;
}

/** A station at a glance: its last 24 hours, how it is doing, and the way to its page. */
export function GlancePanel({ slug, station, zone, nowSec, onClose }: GlancePanelProps) {
  const { data, error } = useLastDay(slug, station.code, station.past?.toSec ?? null);
  const panel = useRef<HTMLElement>(null);
  useEffect(() => {
    // Below the map on a phone; beside it nothing moves.
    void panel.current?.scrollIntoView({ block: 'nearest' });
  }, []);
  const page = `/n/${slug}/stations/${encodeURIComponent(station.code)}${dayQuery(station, zone)}`;
  return (
    <section ref={panel} className="slip text-table" aria-label={`${station.name} at a glance`}>
      <p role="status" className="sr-only">
        {stationSentence(station, zone, nowSec)}
      </p>
      <div className="flex items-start justify-between gap-2">
        <h2 className="text-body">
          <a href={page}>{station.name}</a> <span className="font-normal text-ink-soft">{station.code}</span>
        </h2>
        <button
          type="button"
          onClick={onClose}
          aria-label="Close"
          className="-mt-1 -mr-2 grid size-8 shrink-0 place-items-center text-lead text-ink-soft hover:bg-ink/5"
        >
          ×
        </button>
      </div>
      <p className="flex items-center gap-1.5">
        <StateShape state={markStateOf(station)} />
        {stateLine(station, zone, nowSec)}
        {station.overLimit && <span className="text-rust">· over a limit</span>}
      </p>
      {station.exceedances ? <p>{exceedanceWords(station)}</p> : null}
      <div className="mt-3 min-h-[10.75rem]">
        {error && <p className="border-l-3 border-rust pl-3">{error.message}</p>}
        {data && <DayAtAGlance day={data} zone={zone} name={station.name} when={whenWords(station, zone)} />}
      </div>
      {!station.past && (
        <>
          <HeadroomLines slug={slug} code={station.code} zone={zone} />
          <HealthLines slug={slug} station={station} />
        </>
      )}
      <a className="button button-primary mt-3" href={page}>
        Open the station
      </a>
    </section>
  );
}

function whenWords({ past }: ShownStation, zone: string): string {
  return past ? `the 24 h to ${formatInstant(past.toSec, zone)}` : 'the last 24 h';
}

/** The period of the station's page: the 24 hours up to the moment shown; as usual where that is now. */
function dayQuery({ past }: ShownStation, zone: string): string {
  if (!past) return '';
  return `?from=${urlInstant(past.toSec - DAY_SEC, zone)}&to=${urlInstant(past.toSec, zone)}`;
}

interface DayAtAGlanceProps {
  day: LastDay;
  zone: string;
  name: string;
  /** "the last 24 h" */
  when: string;
}

function DayAtAGlance({ day, zone, name, when }: DayAtAGlanceProps) {
  const { LAeq, LAFmax, coverage, meetsMinimum } = day.statistics;
  return (
    <>
      <dl className="mb-2 flex gap-6">
        <div>
          <dt className="text-small text-ink-soft">
            <Descriptor name="LAeq" window="24 h" />
          </dt>
          <dd>
            <Level levelDb={LAeq} coverage={coverage} meetsMinimum={meetsMinimum} />
          </dd>
        </div>
        <div>
          <dt className="text-small text-ink-soft">
            <Descriptor name="LAFmax" />
          </dt>
          <dd>
            <Level levelDb={LAFmax} />
          </dd>
        </div>
      </dl>
      <p className="text-small text-ink-soft">
        <Descriptor name="LAeq" window="15 min" /> of {when}, dB
      </p>
      <Sparkline
        day={day}
        zone={zone}
        summary={`${name}, ${when}: LAeq of quarter-hours, ${formatLevelDb(LAeq)} dB over all.`}
      />
      <FoldedTable
        label="The quarter-hours as a table"
        columns={[
          'From',
          <Fragment key="LAeq">
            <Descriptor name="LAeq" window="15 min" /> dB
          </Fragment>,
        ]}
        rows={quarterRows(day, zone)}
      />
    </>
  );
}

function quarterRows({ columns, toSec }: LastDay, zone: string) {
  return Array.from(columns.laeqCentiDb, (centiDb, at) => ({
    fromSec: columns.fromSec + at * columns.stepSec,
    levelDb: centiDb === NO_LEVEL_CENTI_DB ? null : centiDb / 100,
  }))
    .filter(({ fromSec }) => fromSec < toSec)
    .map(({ fromSec, levelDb }) => ({
      key: String(fromSec),
      heading: formatClock(fromSec, zone),
      cells: [formatLevelDb(levelDb)],
    }));
}
