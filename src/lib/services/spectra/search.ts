import { listSettings, pickSettings, type NetworkSettings } from '#db/queries/networks';
import { listStations, type StationRow } from '#db/queries/stations';
import { BAND_SLOTS, bandByNominalHz, bandSlot } from '#lib/acoustics/bands';
import { MINIMUM_SHARED_THIRDS } from '#lib/acoustics/likeness';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Statistics } from '#lib/contracts/levels';
import { type SpectrumSearchAnswer, type SpectrumSearchOptions } from '#lib/contracts/spectrumSearch';
import { periodFigures } from '../levels/figures';
import { type Span } from '../levels/spans';
import { statisticsOf } from '../levels/statistics';
import { EMPTY_RESULT, searchAnswer } from './searchAnswer';
import { type SearchTask } from './searchTask';
import { type JobListener } from '../threads/messages';
import { searches } from './threads';

/** A spectrum and where it is looked for. */
export interface SpectrumSearch {
  station: StationRow;
  /** Its mean spectrum is looked for. */
  period: Span;
  /** Dates that are searched. */
  searched: Span;
  /** Codes of stations that are searched; empty: all. */
  codes: readonly string[];
  options: SpectrumSearchOptions;
  nowSec: number;
  /** Looked at nowhere, such as the dates of the period itself. */
  leftOut?: Span;
  /** The search answers what it has found by then. */
  mostMs?: number;
}

const MOST_MS = 20_000;

/**
 * Where else and when the mean spectrum of a station's period was heard: minutes whose shape differs by no more than the asked RMS,
 * grouped to spells. Runs in a thread of its own.
 * @throws {JobsFull | JobCancelled}
 */
export async function searchSpectrum(
  search: SpectrumSearch,
  listener: JobListener = {},
): Promise<SpectrumSearchAnswer> {
  const { station, period, searched, nowSec } = search;
  const [timeline, stations] = await Promise.all([
    listSettings(station.networkId),
    stationsOf(station.networkId, search.codes),
  ]);
  const figures = await periodFigures({ station, nowSec, timeline, ...period });
  const statistics = statisticsOf(figures, { station });
  const levelsDb = comparedLevels(statistics, search.options);
  const state = stateOf(station, statistics, levelsDb);
  const thirds = stations.filter(({ bandFraction }) => bandFraction === 3);
  const task = taskOf(search, { thirds, levelsDb, laeqDb: statistics.LAeq, timeline });
  const { answer: result, dataAsOf } =
    state === 'searched' ? await searches.run(task, listener) : { answer: EMPTY_RESULT, dataAsOf: null };
  return {
    asked: {
      station: station.code,
      stationName: station.name,
      from: formatInstantUtc(period.fromSec),
      to: formatInstantUtc(period.toSec),
      coverage: statistics.coverage,
      meetsMinimum: statistics.meetsMinimum,
      LAeq: statistics.LAeq,
      bands: statistics.bands.flatMap(({ nominalHz, Leq }) =>
        Leq !== null && isCompared(nominalHz, search.options) ? [{ nominalHz, Leq }] : [],
      ),
    },
    since: formatInstantUtc(searched.fromSec),
    until: formatInstantUtc(searched.toSec),
    dataAsOf: dataAsOf && formatInstantUtc(dataAsOf.getTime() / 1000),
    state,
    octaveStations: stations.filter(({ bandFraction }) => bandFraction === 1).map(({ name }) => name),
    ...searchAnswer(result, {
      stations: thirds,
      askedId: station.id,
      order: search.options.order,
      nowSec,
      searched,
    }),
  };
}

async function stationsOf(networkId: number, codes: readonly string[]): Promise<StationRow[]> {
  const all = await listStations(networkId);
  return codes.length === 0 ? all : all.filter(({ code }) => codes.includes(code));
}

function isCompared(nominalHz: number, { lowHz = 0, highHz = Infinity }: SpectrumSearchOptions): boolean {
  return lowHz <= nominalHz && nominalHz <= highHz;
}

/** By band slot; null where a band is not compared. */
function comparedLevels({ bands }: Statistics, options: SpectrumSearchOptions): (number | null)[] {
  const levelsDb = new Array<number | null>(BAND_SLOTS).fill(null);
  for (const { nominalHz, Leq } of bands) {
    const band = bandByNominalHz(3, nominalHz);
    if (band && isCompared(nominalHz, options)) levelsDb[bandSlot(band.index)] = Leq;
  }
  return levelsDb;
}

function stateOf(
  station: StationRow,
  { LAeq }: Statistics,
  levelsDb: readonly (number | null)[],
): SpectrumSearchAnswer['state'] {
  if (station.bandFraction === 1) return 'octave-bands';
  if (LAeq === null) return 'no-data';
  const known = levelsDb.filter((levelDb) => levelDb !== null).length;
  return known < MINIMUM_SHARED_THIRDS ? 'too-few-bands' : 'searched';
}

interface Prepared {
  thirds: StationRow[];
  levelsDb: (number | null)[];
  laeqDb: number | null;
  timeline: NetworkSettings[];
}

function taskOf(
  { station, period, searched, options, nowSec, leftOut, mostMs = MOST_MS }: SpectrumSearch,
  { thirds, levelsDb, laeqDb, timeline }: Prepared,
): SearchTask {
  return {
    networkId: station.networkId,
    stations: thirds.map(({ id, intervalSec }) => ({ id, intervalSec })),
    fromSec: searched.fromSec,
    toSec: searched.toSec,
    asked: { stationId: station.id, ...period },
    leftOut: leftOut ?? null,
    query: { levelsDb, laeqDb, mostRmsDb: options.likeness, withinDb: options.within ?? null },
    gapMinutes: options.gap,
    timeZone: pickSettings(timeline, nowSec).timeZone,
    mostMs,
  };
}
