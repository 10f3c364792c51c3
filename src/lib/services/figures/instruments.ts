import { listDeployments } from '#db/queries/deployments';
import { findInstrument, type InstrumentRow } from '#db/queries/instruments';
import { CLASS_1_UNCERTAINTY_DB } from '#lib/acoustics/uncertainty';
import { withoutSpans, type Span } from '../levels/spans';
import { type SheetSource } from './source';

/** Standard uncertainty in dB of a class 2 instrument (ISO 1996-2:2017, from memory). */
const CLASS_2_UNCERTAINTY_DB = 1.5;

/** The instruments that made a period's figures, as far as they are on record. */
export interface PeriodInstruments {
  words: string;
  /** Standard uncertainty of the least of them, dB. */
  uncertaintyDb: number;
  /** What that rests on: "class 2", "class 1 assumed". */
  basis: string;
}

/** Instruments that stood at the station in the period, in order of time. */
export async function instrumentsOf({
  station,
  period,
  conn,
}: Pick<SheetSource, 'station' | 'period' | 'conn'>): Promise<PeriodInstruments> {
  const stays = (await listDeployments(station.networkId, conn))
    .filter(({ stationId, withdrawnAt }) => stationId === station.id && withdrawnAt === null)
    .map((stay) => ({ ...stay, fromSec: stay.startSec, toSec: stay.endSec ?? Infinity }))
    .filter(({ fromSec, toSec }) => fromSec < period.toSec && toSec > period.fromSec)
    .sort((a, b) => a.fromSec - b.fromSec);
  const instruments: InstrumentRow[] = [];
  for (const id of new Set(stays.map(({ instrumentId }) => instrumentId))) {
    const instrument = await findInstrument(station.networkId, id, conn);
    if (instrument) instruments.push(instrument);
  }
  return describe(instruments, isWhole(period, stays));
}

function describe(instruments: readonly InstrumentRow[], isWholePeriod: boolean): PeriodInstruments {
  if (instruments.length === 0) {
    return {
      words: 'none is on record for this period',
      uncertaintyDb: CLASS_1_UNCERTAINTY_DB,
      basis: 'class 1 assumed, none is on record',
    };
  }
  const isClass2 = instruments.some((instrument) => instrument.class === 2);
  const named = instruments.map(wordsOf).join('; then ');
  return {
    words: isWholePeriod ? named : `${named}; for a part of the period none is on record`,
    uncertaintyDb: isClass2 ? CLASS_2_UNCERTAINTY_DB : CLASS_1_UNCERTAINTY_DB,
    basis: isClass2 ? 'class 2' : 'class 1',
  };
}

function wordsOf({ serialNumber, description, microphone, ...instrument }: InstrumentRow): string {
  const parts = [
    description,
    `class ${instrument.class}`,
    `serial number ${serialNumber}`,
    microphone && `microphone ${microphone}`,
  ];
  return parts.filter((part) => part !== '').join(', ');
}

function isWhole(period: Span, stays: readonly Span[]): boolean {
  return withoutSpans(period, stays).every(({ fromSec, toSec }) => fromSec >= toSec);
}
