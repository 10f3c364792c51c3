import type { Content, TableCell } from 'pdfmake/interfaces';
import type { Evidence, EvidenceContext } from '#lib/contracts/complaintEvidence';
import type { EvidencePack, Standing } from '#lib/contracts/evidencePack';
import { formatCoverage, formatLevelDb, NO_FIGURE } from '#lib/format/levels';
import { limitValueText } from '#lib/format/limitMetric';
import { formatPeriod } from '#lib/format/times';
import {
  BOOK_TABLE,
  cell,
  head,
  heading,
  paragraph,
  SMALL_SIZE,
  SOFT_INK,
  typeset,
} from '../../summaries/pdf/typography';
import { instantSec } from '../letter/instants';
import { distanceInWords } from '../whereabouts';

const VERDICT_WORDS: Readonly<Record<Standing['verdict'], string>> = {
  near: 'yes',
  area: 'in part',
  far: 'no',
  'no-data': 'no',
  'unknown-place': 'not known',
};

/** The nearest stations, where they stand seen from the place, and why each does or does not speak for it. */
export function stationsTable({ evidence, standings }: EvidencePack): Content[] {
  if (standings.length === 0) return [heading('Stations'), paragraph('The network had no station near.')];
  const rows = standings.map((standing): TableCell[] => [
    cell(nameOf(evidence, standing.station), 'left'),
    cell(
      standing.distanceM === null
        ? NO_FIGURE
        : `${distanceInWords(standing.distanceM)}, ${standing.wind ?? ''}`,
      'left',
    ),
    cell(VERDICT_WORDS[standing.verdict], 'left'),
    cell(`${standing.reasons.join('; ')}.`, 'left'),
  ]);
  return [
    heading('Stations'),
    {
      layout: BOOK_TABLE,
      table: {
        headerRows: 1,
        dontBreakRows: true,
        widths: [100, 90, 55, '*'],
        body: [
          [
            head('Station', 'left'),
            head('From you', 'left'),
            head('Speaks for the place', 'left'),
            head('Because', 'left'),
          ],
          ...rows,
        ],
      },
    },
  ];
}

/** Levels of each station with coverage and uncertainty. */
export function levelsTable(evidence: Evidence): Content[] {
  const heads = ['LAeq', 'LAFmax', 'LA10', 'LA90', 'Coverage', 'U of LAeq'];
  const [nearest] = evidence.stations;
  const samples =
    nearest?.sampleSeconds === null || nearest === undefined
      ? ''
      : ` LA10 and LA90 are of LAeq,${nearest.sampleSeconds} s.`;
  return [
    heading('Levels'),
    {
      layout: BOOK_TABLE,
      table: {
        headerRows: 1,
        widths: ['*', ...heads.map(() => 'auto' as const)],
        body: [
          [head('Station', 'left'), ...heads.map((text) => head(text))],
          ...evidence.stations.map((station): TableCell[] => [
            cell(`${station.station} ${station.name}`, 'left'),
            ...[station.LAeq, station.LAFmax, station.LA10, station.LA90].map((level) =>
              cell(formatLevelDb(level)),
            ),
            cell(`${formatCoverage(station.coverage)}${station.meetsMinimum ? '' : ' *'}`),
            cell(formatLevelDb(station.context?.uncertainty)),
          ]),
        ],
      },
    },
    note(
      `dB. Coverage: the part of the time with valid measurements; * below the ${formatCoverage(evidence.minimumCoverage)} that a ` +
        `level is judged from.${samples}`,
    ),
    ...(nearest?.context
      ? [note(`Uncertainty at ${nearest.name}: ${nearest.context.uncertaintyBasis}.`)]
      : []),
  ];
}

/** What is usual at each station for that weekday and hour, and where the level ranks among it. */
export function usualTable(evidence: Evidence): Content[] {
  const heads = ['LAeq', 'Usual, middle', 'Usual, 10 % to 90 %', 'Rank', 'Weeks'];
  return [
    heading('Against the usual'),
    {
      layout: BOOK_TABLE,
      table: {
        headerRows: 1,
        widths: ['*', ...heads.map(() => 'auto' as const)],
        body: [
          [head('Station', 'left'), ...heads.map((text) => head(text))],
          ...evidence.stations.map(({ station, name, LAeq, usual, context }): TableCell[] => [
            cell(`${station} ${name}`, 'left'),
            cell(formatLevelDb(LAeq)),
            cell(formatLevelDb(usual.median)),
            cell(
              usual.low === null ? NO_FIGURE : `${formatLevelDb(usual.low)} to ${formatLevelDb(usual.high)}`,
            ),
            cell(context?.rank === null || context?.rank === undefined ? NO_FIGURE : `${context.rank} %`),
            cell(`${usual.validWeeks} of ${usual.weeks}`),
          ]),
        ],
      },
    },
    note(
      'The same weekday and hours in the weeks before, those with enough data. Rank: percentile rank, 100·(below + equal/2)/n; ' +
        '100 % is louder than all of them.',
    ),
  ];
}

/** Limits in force at the nearest station, with their windows that overlap. */
export function limitsTable(evidence: Evidence): Content[] {
  const [nearest] = evidence.stations;
  if (!nearest) return [];
  const limits = nearest.context?.limits ?? [];
  if (limits.length === 0) {
    return [
      heading('Limits in force'),
      paragraph(`No limit of ${nearest.name} has a window that overlaps this time.`),
    ];
  }
  return [
    heading('Limits in force'),
    {
      layout: BOOK_TABLE,
      table: {
        headerRows: 1,
        dontBreakRows: true,
        widths: ['*', 'auto', 'auto', 'auto', 'auto'],
        body: [
          [
            head('Limit', 'left'),
            head('Quantity', 'left'),
            head('Value'),
            head('Window', 'left'),
            head('Exceedance', 'left'),
          ],
          ...limits.map((limit): TableCell[] => [
            cell(limit.limit, 'left'),
            cell(limit.metric, 'left'),
            cell(limitValueText(limit.threshold, limit.unit)),
            cell(windowsText(limit, evidence.timeZone), 'left', SMALL_SIZE),
            cell(limit.isExceeded ? 'on record' : 'none on record', 'left'),
          ]),
        ],
      },
    },
    ...(nearest.limits.unjudged > 0 ? [note('Not every window has been judged yet.')] : []),
    note(`At ${nearest.name}.`),
  ];
}

function windowsText({ windows, windowCount }: EvidenceContext['limits'][number], zone: string): string {
  const listed = windows.map(({ from, to }) =>
    formatPeriod({ fromSec: instantSec(from), toSec: instantSec(to) }, zone),
  );
  const more = windowCount - windows.length;
  return [...listed, ...(more > 0 ? [`and ${more} more`] : [])].join('\n');
}

function nameOf(evidence: Evidence, code: string): string {
  return `${code} ${evidence.stations.find(({ station }) => station === code)?.name ?? ''}`;
}

function note(text: string): Content {
  return { ...typeset(text, SMALL_SIZE), color: SOFT_INK, margin: [0, 3, 0, 0] };
}
