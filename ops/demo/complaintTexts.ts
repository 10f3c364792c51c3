import type { ComplaintKind } from '#lib/contracts/complaints';

/** Invented residents. `hour` is the local hour, `daysAgo` counts from the day on which the demo is made. */
export interface DemoComplaint {
  daysAgo: number;
  hour: number;
  minutes: number;
  station: string;
  kind: ComplaintKind;
  words: string;
  name: string;
  isAnswered: boolean;
}

export const DEMO_COMPLAINTS: DemoComplaint[] = [
  {
    daysAgo: 1,
    hour: 3.67,
    minutes: 50,
    station: 'MER-02',
    kind: 'hum',
    words: 'Woken at twenty to four by a steady hum, I feel it in the bed frame.',
    name: 'Odile Farrow',
    isAnswered: false,
  },
  {
    daysAgo: 2,
    hour: 22.5,
    minutes: 90,
    station: 'MER-02',
    kind: 'hum',
    words: 'The hum from the silo again, windows shut and still there.',
    name: 'Piers Halloway',
    isAnswered: false,
  },
  {
    daysAgo: 4,
    hour: 5.25,
    minutes: 30,
    station: 'MER-03',
    kind: 'bang',
    words: 'Wagons banging together before half past five.',
    name: 'Greta Lindqvist',
    isAnswered: false,
  },
  {
    daysAgo: 6,
    hour: 13,
    minutes: 60,
    station: 'MER-05',
    kind: 'rumble',
    words: 'One lorry after another, could not hear the radio in the garden.',
    name: 'Amos Tarrant',
    isAnswered: false,
  },
  {
    daysAgo: 9,
    hour: 1.5,
    minutes: 40,
    station: 'MER-06',
    kind: 'rumble',
    words: 'A long train, the glasses rattled in the cupboard.',
    name: 'Bettina Crewe',
    isAnswered: true,
  },
  {
    daysAgo: 13,
    hour: 23.25,
    minutes: 120,
    station: 'MER-08',
    kind: 'traffic',
    words: 'Ferry engines left running at the steps.',
    name: 'Joss Penhallow',
    isAnswered: true,
  },
  {
    daysAgo: 17,
    hour: 2.75,
    minutes: 60,
    station: 'MER-02',
    kind: 'hum',
    words: 'Low note, always the same, every weekday night now.',
    name: 'Odile Farrow',
    isAnswered: true,
  },
  {
    daysAgo: 22,
    hour: 10,
    minutes: 30,
    station: 'MER-06',
    kind: 'other',
    words: 'The bell is fine, but please not for a quarter of an hour.',
    name: 'Hal Bright',
    isAnswered: true,
  },
  {
    daysAgo: 28,
    hour: 19.5,
    minutes: 60,
    station: 'MER-04',
    kind: 'alarm',
    words: 'Reversing alarms from the quay all evening.',
    name: 'Suki Arden',
    isAnswered: true,
  },
  {
    daysAgo: 35,
    hour: 4,
    minutes: 45,
    station: 'MER-01',
    kind: 'bang',
    words: 'Containers set down hard, three times in ten minutes.',
    name: 'Marten Oakes',
    isAnswered: true,
  },
  {
    daysAgo: 44,
    hour: 6.25,
    minutes: 60,
    station: 'MER-05',
    kind: 'rumble',
    words: 'They start before seven. They are not meant to.',
    name: 'Amos Tarrant',
    isAnswered: true,
  },
  {
    daysAgo: 58,
    hour: 0.5,
    minutes: 90,
    station: 'MER-04',
    kind: 'whine',
    words: 'A thin whine that comes and goes with the wind.',
    name: 'Ivo Castell',
    isAnswered: true,
  },
];
