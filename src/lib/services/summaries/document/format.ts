import { DateTime } from 'luxon';
import { parseInstant } from '#lib/contracts/common';
import { formatCoverage, formatDifferenceDb, formatLevelDb } from '#lib/format/levels';
import { type MonthWords } from './words/words';

/** Mark of a figure whose coverage is below the minimum. */
export const BELOW_MINIMUM = '†';

/** Numbers and times as a month’s document writes them in its language and zone. */
export class DocumentFormat {
  constructor(
    private readonly words: MonthWords,
    private readonly zone: string,
  ) {}

  /** "64.9"; a dash where there is none; a mark before one whose coverage is below the minimum. */
  level(levelDb: number | null, meetsMinimum = true): string {
    const text = this.decimals(formatLevelDb(levelDb));
    return levelDb === null || meetsMinimum ? text : `${BELOW_MINIMUM} ${text}`;
  }

  /** "1.3" of an uncertainty; nothing where it is not told. */
  uncertainty(db: number | null): string {
    return db === null ? '' : this.decimals(formatLevelDb(db));
  }

  difference(db: number | null): string {
    return db === null ? this.level(null) : this.decimals(formatDifferenceDb(db));
  }

  /** A value of a limit, with its unit where that is not dB. */
  value(value: number | null, unit: 'dB' | '%' | 'events'): string {
    if (value === null || unit === 'dB') return this.level(value);
    return unit === '%' ? `${this.level(value)} %` : String(value);
  }

  /** Never rounded up to a whole. */
  coverage(coverage: number): string {
    return formatCoverage(coverage);
  }

  number(value: number | null, digits: number): string {
    return value === null ? this.level(null) : this.decimals(value.toFixed(digits));
  }

  /** "Tue 17 March 2026, 03:40 GMT". */
  instant(instant: string): string {
    return this.at(instant).toFormat('ccc d LLLL yyyy, HH:mm ZZZZ');
  }

  /** "2026-03-17 03:40", for columns. */
  shortInstant(instant: string): string {
    return this.at(instant).toFormat('yyyy-MM-dd HH:mm');
  }

  /** "17 March 2026" of an instant. */
  date(instant: string): string {
    return this.at(instant).toFormat('d LLLL yyyy');
  }

  /** "17 March 2026" of a local date. */
  localDate(date: string): string {
    return DateTime.fromISO(date, { locale: this.words.tag }).toFormat('d LLLL yyyy');
  }

  /** "3 h 20 min" of whole minutes. */
  duration(seconds: number): string {
    const minutes = Math.round(seconds / 60);
    const hours = Math.floor(minutes / 60);
    return hours === 0 ? `${minutes} min` : `${hours} h ${minutes % 60} min`;
  }

  private at(instant: string): DateTime {
    return DateTime.fromSeconds(parseInstant(instant) ?? NaN, { zone: this.zone, locale: this.words.tag });
  }

  private decimals(text: string): string {
    return this.words.decimal === '.' ? text : text.replace('.', this.words.decimal);
  }
}
