import { type DocumentLimit, type MonthDocument } from '#lib/contracts/monthDocument';
import { type Compliance, type DocumentExceedance, type ExclusionEffect } from '#lib/contracts/monthEvidence';
import {
  count,
  instant,
  level,
  plainNumber,
  seconds,
  share,
  text,
  topicTable,
  type TopicTable,
} from './table';

type Of<Row> = { station: string; of: Row };

const station = text<{ station: string }>('station', 'Code of the station', (row) => row.station);

function each<Row>(
  { stations }: MonthDocument,
  rows: (station: MonthDocument['stations'][number]) => readonly Row[],
): Of<Row>[] {
  return stations.flatMap((one) => rows(one).map((of) => ({ station: one.code, of })));
}

/** Versions of limits in force in the month. */
export function limitsTable({ limits }: MonthDocument): TopicTable {
  return topicTable<DocumentLimit>(
    {
      name: 'limits',
      title: 'Limits',
      description: 'Versions of limits that were in force at some time of the month.',
      key: ['limit_id', 'version'],
    },
    [
      count('limit_id', 'Number of the limit', ({ id }) => id),
      count('version', 'Number of the version', ({ version }) => version),
      text('limit', 'Name', ({ name }) => name),
      text('compared', 'What is compared', ({ descriptor }) => descriptor),
      plainNumber('threshold', 'Exceeded when greater', ({ threshold }) => threshold),
      text('unit', 'Unit of the threshold', ({ unit }) => unit),
      text('weekdays', 'Local weekdays on which windows begin', ({ weekdays }) => weekdays.join(' ')),
      text('holidays', 'What named dates are to it', ({ holidays }) => holidays),
      text('from_clock', 'Local time from which on', (limit) => limit.from),
      text('to_clock', 'Local time until which', (limit) => limit.to),
      text('wind', 'Wind at which it holds; empty: any', ({ windWords }) => windWords),
      share(
        'minimum_coverage',
        'Coverage that a window needs; empty: the network’s',
        (limit) => limit.minimumCoverage,
      ),
      text('stations', 'Codes; empty: every station', ({ stations }) => stations?.join(' ')),
      instant('in_force_from', 'From when on', ({ effectiveFrom }) => effectiveFrom),
      instant('in_force_to', 'Until when; empty: still', ({ effectiveTo }) => effectiveTo),
      text('reason', 'Why it was set so', ({ reason }) => reason),
    ],
    limits,
  );
}

/** How stations stand to limits. */
export function complianceTable(doc: MonthDocument): TopicTable {
  return topicTable<Of<Compliance>>(
    {
      name: 'compliance',
      title: 'Compliance',
      description: 'How each station stands to each version of a limit that holds for it.',
      key: ['station', 'limit_id', 'version'],
    },
    [
      station,
      count('limit_id', 'Number of the limit', ({ of }) => of.limitId),
      count('version', 'Number of the version', ({ of }) => of.limitVersion),
      text('limit', 'Name', ({ of }) => of.limit),
      text('compared', 'What is compared', ({ of }) => of.metric),
      plainNumber('threshold', 'Exceeded when greater', ({ of }) => of.threshold),
      text('unit', 'Unit of threshold and level', ({ of }) => of.unit),
      count(
        'windows_ended',
        'Windows of the month that ended; empty: not counted',
        ({ of }) => of.windows?.ended,
      ),
      count(
        'windows_compared',
        'Of them with the coverage that a comparison needs',
        ({ of }) => of.windows?.compared,
      ),
      count('exceedances_standing', 'Standing exceedances', ({ of }) => of.standing),
      count('exceedances_lifted', 'Exceedances that were lifted', ({ of }) => of.lifted),
      plainNumber('highest', 'Highest level of a standing exceedance', ({ of }) => of.highest),
      text('state', 'exceeded, not-exceeded or not-compared', ({ of }) => of.state),
    ],
    each(doc, ({ compliance }) => compliance),
  );
}

/** Exceedances of the month. */
export function exceedancesTable(doc: MonthDocument): TopicTable {
  return topicTable<Of<DocumentExceedance>>(
    {
      name: 'exceedances',
      title: 'Exceedances',
      description: 'Exceedances whose window begins in the month; lifted ones too.',
      key: ['id'],
    },
    [
      count('id', 'Number of the exceedance', ({ of }) => of.id),
      station,
      count('limit_id', 'Number of the limit', ({ of }) => of.limitId),
      count('version', 'Version that judged it', ({ of }) => of.limitVersion),
      text('limit', 'Name', ({ of }) => of.limit),
      text('compared', 'What is compared', ({ of }) => of.metric),
      instant('from', 'Beginning of the window', ({ of }) => of.from),
      instant('to', 'End of the window', ({ of }) => of.to),
      plainNumber('level', 'Level of the window', ({ of }) => of.level),
      plainNumber('threshold', 'The limit', ({ of }) => of.threshold),
      text('unit', 'Of both', ({ of }) => of.unit),
      share('coverage', 'Of the window', ({ of }) => of.coverage),
      text('state', 'standing or lifted', ({ of }) => of.state),
      text('cause', 'As acknowledged; empty: nobody has said', ({ of }) => of.cause),
      text('cause_detail', 'The cause in own words', ({ of }) => of.causeDetail),
    ],
    each(doc, ({ exceedances }) => exceedances.items),
  );
}

/** Standing exclusions by an operator. */
export function exclusionsTable(doc: MonthDocument): TopicTable {
  return topicTable<Of<ExclusionEffect['items'][number]>>(
    {
      name: 'exclusions',
      title: 'Exclusions',
      description: 'Standing exclusions that touch the month.',
      key: ['station', 'from', 'to'],
    },
    [
      station,
      instant('from', 'Beginning', ({ of }) => of.from),
      instant('to', 'End', ({ of }) => of.to),
      text('reason', 'Reason', ({ of }) => of.reason),
    ],
    each(doc, ({ exclusions }) => exclusions.items),
  );
}

/** Time left out by reason. */
export function leftOutTable(doc: MonthDocument): TopicTable {
  return topicTable<Of<ExclusionEffect['leftOut'][number]>>(
    {
      name: 'left_out',
      title: 'Left out',
      description: 'Time measured and left out of the figures, by reason; an interval may have several.',
      key: ['station', 'reason'],
    },
    [
      station,
      text('reason', 'Why', ({ of }) => of.reason),
      seconds('seconds', 'How long', ({ of }) => of.seconds),
    ],
    each(doc, ({ exclusions }) => exclusions.leftOut),
  );
}

/** The same figures with and without what is left out. */
export function effectTable(doc: MonthDocument): TopicTable {
  return topicTable<Of<ExclusionEffect['figures'][number]>>(
    {
      name: 'exclusion_effect',
      title: 'Effect of exclusions',
      description: 'Figures of the month with and without what rules and exclusions leave out.',
      key: ['station', 'quantity'],
    },
    [
      station,
      text('quantity', 'Name of the figure', ({ of }) => of.quantity),
      level('valid_db', 'As summarised, dB', ({ of }) => of.valid),
      level('all_db', 'Of everything measured, dB', ({ of }) => of.all),
      level('difference_db', 'Valid less all, dB', ({ of }) => of.difference),
    ],
    each(doc, ({ exclusions }) => exclusions.figures),
  );
}
