import { useEffect, useRef } from 'react';
import type { Station } from '#lib/contracts/stations';
import { formatLevelDb } from '#lib/format/levels';
import { HeadroomLines } from '../../headroom/HeadroomLines';
import { Descriptor } from '../../ui/Descriptor';
import { Level } from '../../ui/Level';
import { stateWords } from '../../stations/stateWords';
import { useLastDay, type LastDay } from '../hooks/useLastDay';
import { markStateOf, stationSentence } from '../model/stationWords';
import { Sparkline } from './Sparkline';
import { StateShape } from './StateShape';

interface GlancePanelProps {
  slug: string;
  station: Station;
  zone: string;
  nowSec: number;
  onClose: () => void;
}

/** A station at a glance: its last 24 hours, how it is doing, and the way to its page. */
export function GlancePanel({ slug, station, zone, nowSec, onClose }: GlancePanelProps) {
  const { data, error } = useLastDay(slug, station.code);
  const panel = useRef<HTMLElement>(null);
  useEffect(() => {
    // Below the map on a phone; beside it nothing moves.
    void panel.current?.scrollIntoView({ block: 'nearest' });
  }, []);
  const page = `/n/${slug}/stations/${encodeURIComponent(station.code)}`;
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
        {stateWords(station, zone, nowSec)}
        {station.overLimit && <span className="text-rust">· over a limit</span>}
      </p>
      <div className="mt-3 min-h-[10.75rem]">
        {error && <p className="border-l-3 border-rust pl-3">{error.message}</p>}
        {data && <DayAtAGlance day={data} zone={zone} name={station.name} />}
      </div>
      <HeadroomLines slug={slug} code={station.code} zone={zone} />
      <a className="button button-primary mt-3" href={page}>
        Open the station
      </a>
    </section>
  );
}

function DayAtAGlance({ day, zone, name }: { day: LastDay; zone: string; name: string }) {
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
        <Descriptor name="LAeq" window="15 min" /> of the last 24 h, dB
      </p>
      <Sparkline
        day={day}
        zone={zone}
        summary={`${name}, last 24 hours: LAeq of quarter-hours, ${formatLevelDb(LAeq)} dB over all.`}
      />
    </>
  );
}
