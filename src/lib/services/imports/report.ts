import { formatInstantUtc } from '#lib/contracts/common';
import { ROW_REASONS, type ImportReport, type RowReason } from '#lib/contracts/imports';

const MOST_EXAMPLES = 3;

/** What a check has found so far, as it is kept beside the import. */
export interface KeptReport {
  rows: number;
  accepted: number;
  known: number;
  refused: Partial<Record<RowReason, { count: number; examples: { line: number; detail: string }[] }>>;
  /** Refused records that are kept for the quarantine. */
  kept: number;
  firstStartSec: number | null;
  lastStartSec: number | null;
}

/** A report of nothing, as text. */
export const EMPTY_REPORT = JSON.stringify({
  rows: 0,
  accepted: 0,
  known: 0,
  refused: {},
  kept: 0,
  firstStartSec: null,
  lastStartSec: null,
} satisfies KeptReport);

export function parseReport(text: string): KeptReport {
  return JSON.parse(text) as KeptReport;
}

/** Counts a refused row, with its line as an example while there are few. */
export function noteRefused(report: KeptReport, reason: RowReason, line: number, detail: string): void {
  const entry = (report.refused[reason] ??= { count: 0, examples: [] });
  entry.count += 1;
  if (entry.examples.length < MOST_EXAMPLES) entry.examples.push({ line, detail });
}

/** Counts accepted rows that begin at some instants. */
export function noteAccepted(report: KeptReport, startsSec: readonly number[]): void {
  report.accepted += startsSec.length;
  for (const startSec of startsSec) {
    report.firstStartSec = Math.min(report.firstStartSec ?? startSec, startSec);
    report.lastStartSec = Math.max(report.lastStartSec ?? startSec, startSec);
  }
}

/** The report as the interface gives it. */
export function reportJson({ refused, firstStartSec, lastStartSec, ...report }: KeptReport): ImportReport {
  return {
    rows: report.rows,
    accepted: report.accepted,
    known: report.known,
    conflicting: refused.conflict?.count ?? 0,
    refused: ROW_REASONS.flatMap((reason) => {
      const entry = refused[reason];
      return entry ? [{ reason, ...entry }] : [];
    }),
    firstStart: firstStartSec === null ? null : formatInstantUtc(firstStartSec),
    lastStart: lastStartSec === null ? null : formatInstantUtc(lastStartSec),
  };
}
