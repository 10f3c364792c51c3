import type { Content, TableCell } from 'pdfmake/interfaces';
import type { Evidence, StationEvidence } from '#lib/contracts/complaintEvidence';
import type { Elsewhere, OtherReports } from '#lib/contracts/evidencePack';
import { formatDuration } from '#lib/format/durations';
import { limitValueText } from '#lib/format/limitMetric';
import { formatInstant, formatPeriod } from '#lib/format/times';
import { BOOK_TABLE, cell, head, heading, paragraph } from '../../summaries/pdf/typography';
import { instantSec } from '../letter/instants';

const MOST_SPELLS = 12;

/** Exceedances at any of the stations that overlap the time, those lifted since too. */
export function exceedancesSection({ stations, timeZone }: Evidence): Content[] {
  const rows = stations.flatMap((station) =>
    station.exceedances.map((one): TableCell[] => [
      cell(station.name, 'left'),
      cell(one.limit, 'left'),
      cell(one.metric, 'left'),
      cell(periodText(one, timeZone), 'left'),
      cell(limitValueText(one.level, one.unit ?? 'dB')),
      cell(limitValueText(one.threshold, one.unit ?? 'dB')),
      cell(one.state === 'standing' ? 'stands' : 'lifted', 'left'),
    ]),
  );
  if (rows.length === 0)
    return [heading('Exceedances'), paragraph('None that overlaps this time is on record.')];
  return [
    heading('Exceedances'),
    {
      layout: BOOK_TABLE,
      fontSize: 8,
      table: {
        headerRows: 1,
        dontBreakRows: true,
        widths: ['auto', '*', 'auto', 'auto', 'auto', 'auto', 'auto'],
        body: [
          [
            head('Station', 'left'),
            head('Limit', 'left'),
            head('Quantity', 'left'),
            head('Window', 'left'),
            head('Level'),
            head('Limit'),
            head('State', 'left'),
          ],
          ...rows,
        ],
      },
    },
  ];
}

/** What an operator left out of the time at any of the stations, and why. */
export function exclusionsSection({ stations, timeZone }: Evidence): Content[] {
  const lines = stations.flatMap(({ name, context }) =>
    (context?.exclusions ?? []).map((one) => `${name}: ${periodText(one, timeZone)}: ${one.reason}.`),
  );
  return [
    heading('Measurements left out'),
    ...(lines.length === 0
      ? [paragraph('Nobody left out measurements of this time.')]
      : lines.map(paragraph)),
  ];
}

/** Wind at each station and what its instrument flagged. */
export function weatherSection({ stations }: Evidence): Content[] {
  const lines = stations.flatMap(({ name, context }) =>
    context ? [`${name}: wind ${context.windWords}.${flagsText(context.flags)}`] : [],
  );
  return [heading('Weather and the instrument'), ...lines.map(paragraph)];
}

/** How many others reported; counts alone. */
export function reportsSection({ count, sameKind, withinHours, withinKm }: OtherReports): Content[] {
  return [
    heading('Other reports'),
    paragraph(
      `${count === 0 ? 'None' : String(count)} within ${withinKm} km and ${withinHours} hours of this one` +
        `${count === 0 ? '' : `, ${sameKind} of them of the same kind of sound`}.`,
    ),
  ];
}

/** When the same spectrum was heard otherwise. */
export function elsewhereSection(elsewhere: Elsewhere | null, timeZone: string): Content[] {
  if (!elsewhere) {
    return [heading('The same spectrum otherwise'), paragraph('It has not been looked for.')];
  }
  const { spells, count, since, until, isComplete, isSearched, note } = elsewhere;
  if (!isSearched) {
    return [heading('The same spectrum otherwise'), paragraph(`It could not be looked for. ${note ?? ''}`)];
  }
  const searched = `${formatInstant(instantSec(since), timeZone)} to ${formatInstant(instantSec(until), timeZone)}`;
  const found = spells
    .slice(0, MOST_SPELLS)
    .map(
      (spell) =>
        `${spell.station}: ${periodText(spell, timeZone)}, within ${spell.likenessDb.toFixed(1)} dB.`,
    );
  const more = count - found.length;
  return [
    heading('The same spectrum otherwise'),
    paragraph(
      `Searched from ${searched}: ${count === 0 ? 'not found' : `found ${count} times`}.` +
        `${isComplete ? '' : ' The search was not complete.'}${note === null ? '' : ` ${note}`}`,
    ),
    ...found.map(paragraph),
    ...(more > 0 ? [paragraph(`And ${more} more.`)] : []),
  ];
}

function flagsText(flags: { flag: string; seconds: number }[]): string {
  if (flags.length === 0) return ' The instrument flagged nothing.';
  return ` Flagged: ${flags.map(({ flag, seconds }) => `${flag} ${formatDuration(Math.round(seconds))}`).join(', ')}.`;
}

function periodText(
  { from, to }: Pick<StationEvidence['exceedances'][number], 'from' | 'to'>,
  zone: string,
): string {
  return formatPeriod({ fromSec: instantSec(from), toSec: instantSec(to) }, zone);
}
