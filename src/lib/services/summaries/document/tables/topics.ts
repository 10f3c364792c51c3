import { type MonthDocument } from '#lib/contracts/monthDocument';
import { type Convention } from '#lib/contracts/summaries';
import {
  complianceTable,
  effectTable,
  exceedancesTable,
  exclusionsTable,
  leftOutTable,
  limitsTable,
} from './evidenceTables';
import { bandsTable, daysTable, hoursTable, monthLevels, yearToDateTable } from './levelTables';
import {
  calibrationsTable,
  instrumentsTable,
  screeningTable,
  stationsTable,
  tonesTable,
  weatherTable,
} from './stationTables';
import { count, instant, share, speed, text, topicTable, truth, type TopicTable } from './table';

/** Every topic of a month: what workbook and CSV files are written from. */
export function topicTables(doc: MonthDocument): TopicTable[] {
  return [
    stationsTable(doc),
    monthLevels(doc),
    yearToDateTable(doc),
    daysTable(doc),
    hoursTable(doc),
    bandsTable(doc),
    limitsTable(doc),
    complianceTable(doc),
    exceedancesTable(doc),
    screeningTable(doc),
    tonesTable(doc),
    exclusionsTable(doc),
    leftOutTable(doc),
    effectTable(doc),
    instrumentsTable(doc),
    calibrationsTable(doc),
    weatherTable(doc),
    complaintsTable(doc),
    conventionsTable(doc),
  ];
}

function complaintsTable({ complaints }: MonthDocument): TopicTable {
  return topicTable<[string, number]>(
    {
      name: 'complaints',
      title: 'Complaints',
      description:
        'How many complaints are about noise that began in the month; nothing else of them is told.',
      key: ['state'],
    },
    [
      text('state', 'How they stand', ([state]) => state),
      count('complaints', 'How many', ([, many]) => many),
    ],
    Object.entries(complaints),
  );
}

function conventionsTable({ conventions }: MonthDocument): TopicTable {
  return topicTable<Convention>(
    {
      name: 'conventions',
      title: 'Conventions',
      description: 'Settings of the network that the figures follow, in order of time.',
      key: ['time_zone', 'from'],
    },
    [
      instant('from', 'From when on; empty: since before the month', ({ from }) => from),
      text('time_zone', 'Zone of the clock', ({ timeZone }) => timeZone),
      text('day', 'Clock time at which the day begins', ({ day }) => day),
      text('evening', 'The evening; empty: none', ({ evening }) => evening),
      text('night', 'The night', ({ night }) => night),
      share('minimum_coverage', 'Coverage that a figure needs to be compared', (one) => one.minimumCoverage),
      speed('maximum_wind_speed_ms', 'Windier intervals are left out', (one) => one.maximumWindSpeed),
      truth('exclude_rain', 'Whether rain is left out', (one) => one.excludeRain),
    ],
    conventions,
  );
}
