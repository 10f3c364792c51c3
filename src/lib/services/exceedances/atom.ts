import { listExceedances, type ExceedanceFilter, type ExceedanceRow } from '#db/queries/exceedances';
import { escapeHtml } from '#lib/format/escapeHtml';
import { formatCoverage } from '#lib/format/levels';
import { limitValueText } from '#lib/format/limitMetric';
import { formatPeriod, formatZone } from '#lib/format/times';
import { exceedanceView } from './view';

/** A feed holds so many of the latest windows. */
const MOST_ENTRIES = 100;

interface FeedPlace {
  networkId: number;
  networkName: string;
  /** Address of the network's exceedances. */
  listUrl: string;
  /** Address of the feed, without its token. */
  feedUrl: string;
  timeZone: string;
}

/** The latest exceedances of a filter as an Atom feed (RFC 4287). Who acknowledged them and what was noted stays inside. */
export async function exceedancesAtom(place: FeedPlace, filter: ExceedanceFilter): Promise<string> {
  const rows = await listExceedances(place.networkId, filter, { limit: MOST_ENTRIES, after: null });
  const updated = Math.max(0, ...rows.map((row) => updatedAt(row).getTime()));
  return [
    '<?xml version="1.0" encoding="utf-8"?>',
    '<feed xmlns="http://www.w3.org/2005/Atom">',
    `<id>${xml(place.feedUrl)}</id>`,
    `<title>${xml(`Exceedances in ${place.networkName}`)}</title>`,
    `<updated>${new Date(updated).toISOString()}</updated>`,
    `<author><name>${xml(place.networkName)}</name></author>`,
    `<link rel="alternate" type="text/html" href="${xml(place.listUrl)}"/>`,
    ...rows.map((row) => entryOf(row, place)),
    '</feed>',
    '',
  ].join('\n');
}

function entryOf(row: ExceedanceRow, { listUrl, timeZone }: FeedPlace): string {
  const exceedance = exceedanceView(row);
  const { station, stationName, unit } = exceedance;
  const url = `${listUrl}/${row.id}`;
  const window = { fromSec: row.startsAtSec, toSec: row.endsAtSec };
  const isLifted = row.state === 'lifted';
  const finding = isLifted
    ? 'no longer above the limit'
    : `above the limit by ${limitValueText(exceedance.excess, unit)}`;
  const summary =
    `${exceedance.limit.name}: ${exceedance.descriptor} ${limitValueText(exceedance.level, unit)} against ` +
    `${limitValueText(exceedance.threshold, unit)}, ${formatPeriod(window, timeZone)}, ` +
    `${formatZone(timeZone, window)}; ${formatCoverage(exceedance.coverage)} covered.`;
  return [
    '<entry>',
    `<id>${xml(url)}</id>`,
    `<title>${xml(`${station} ${stationName}: ${finding}`)}</title>`,
    `<link rel="alternate" type="text/html" href="${xml(url)}"/>`,
    `<published>${row.detectedAt.toISOString()}</published>`,
    `<updated>${updatedAt(row).toISOString()}</updated>`,
    `<category term="${row.state}"/>`,
    `<summary>${xml(summary)}</summary>`,
    '</entry>',
  ].join('\n');
}

const updatedAt = ({ revisedAt, detectedAt }: ExceedanceRow) => revisedAt ?? detectedAt;

/** Text for XML 1.0, which has no place for control characters. */
function xml(text: string): string {
  return escapeHtml(text.replace(/[^\P{Cc}\t\n\r]|\uFFFE|\uFFFF/gu, ''));
}
