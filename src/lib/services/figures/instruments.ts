import { listCalibrations } from '#db/queries/calibrations';
import { type Connection } from '#db/queries/connection';
import { selectStaysAt } from '#db/queries/deployments';
import { CLASS_1_UNCERTAINTY_DB } from '#lib/acoustics/uncertainty';
import { type PeriodInstrument } from '#lib/contracts/periodInstruments';
import { instrumentsWords } from '#lib/format/instruments';
import { madeBy } from '../calibrations/madeBy';
import { periodDrift, type PeriodDrift } from '../calibrations/periodDrift';
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
  basisKind: 'class-1' | 'class-2' | 'class-1-assumed';
  /** How far they may have been off, by their checks. */
  drift: PeriodDrift;
}

/** Instruments that stood at the station in the period, in order of time. */
export async function instrumentsOf({
  station,
  period,
  timeZone,
  conn,
}: Pick<SheetSource, 'station' | 'period' | 'timeZone' | 'conn'>): Promise<PeriodInstruments> {
  const instruments = await madeBy(station, period, conn);
  const words = instrumentsWords(instruments, timeZone);
  const drift = await driftOf(station, period, conn);
  if (instruments.length === 0) {
    return {
      words,
      uncertaintyDb: CLASS_1_UNCERTAINTY_DB,
      basis: 'class 1 assumed, none is on record',
      basisKind: 'class-1-assumed',
      drift,
    };
  }
  const isClass2 = instruments.some((instrument) => instrument.class === 2);
  return {
    words: isWhole(period, instruments) ? words : `${words}; for a part of the period none is on record`,
    uncertaintyDb: isClass2 ? CLASS_2_UNCERTAINTY_DB : CLASS_1_UNCERTAINTY_DB,
    basis: isClass2 ? 'class 2' : 'class 1',
    basisKind: isClass2 ? 'class-2' : 'class-1',
    drift,
  };
}

async function driftOf(
  station: SheetSource['station'],
  period: Span,
  conn: Connection,
): Promise<PeriodDrift> {
  const [stays, checks] = await Promise.all([
    selectStaysAt(station.id, period.fromSec, period.toSec, conn),
    listCalibrations(station.networkId, null, conn),
  ]);
  const standing = checks.filter(({ withdrawnAt }) => withdrawnAt === null);
  return periodDrift(period, stays, standing);
}

function isWhole(period: Span, instruments: readonly PeriodInstrument[]): boolean {
  const parts = instruments.map(({ from, to }) => ({
    fromSec: Date.parse(from) / 1000,
    toSec: Date.parse(to) / 1000,
  }));
  return withoutSpans(period, parts).every(({ fromSec, toSec }) => fromSec >= toSec);
}
