/** A check of an instrument; `arrival`: when its stay began. Levels in dB. */
export interface DemoCheck {
  daysAgo: number | 'arrival';
  before: number;
  after: number | null;
  checkedBy: string;
  note: string;
}

export interface DemoInstrument {
  serialNumber: string;
  class: 1 | 2;
  description: string;
  microphone: string;
  /** Days before the demo was made; null: since the station's first interval, and until now. */
  stay: { code: string; fromDaysAgo: number | null; toDaysAgo: number | null; note: string };
  checks: DemoCheck[];
}

const METER = 'Logging sound level meter, outdoor set';
const since = (code: string, note = '') => ({ code, fromDaysAgo: null, toDaysAgo: null, note });
const check = (daysAgo: DemoCheck['daysAgo'], before: number, note = ''): DemoCheck => ({
  daysAgo,
  before,
  after: null,
  checkedBy: 'Ines Operator',
  note,
});
const ON_ARRIVAL = 'On arrival';
const SWAPPED_DAYS_AGO = 21;

/** The demo's instruments: one was swapped, one has drifted beyond the bound, one is due for its check. */
export const DEMO_INSTRUMENTS: DemoInstrument[] = [
  {
    serialNumber: 'M1-2207',
    class: 1,
    description: METER,
    microphone: 'Half-inch, 31180',
    stay: since('MER-01'),
    checks: [check('arrival', 94, ON_ARRIVAL), check(17, 94.1, 'Windscreen replaced')],
  },
  {
    serialNumber: 'M1-2208',
    class: 1,
    description: METER,
    microphone: 'Half-inch, 31184',
    stay: since('MER-02'),
    checks: [check('arrival', 94.1, ON_ARRIVAL), check(16, 93.9)],
  },
  {
    serialNumber: 'M1-2211',
    class: 1,
    description: METER,
    microphone: 'Half-inch, 31190',
    stay: since('MER-03'),
    checks: [
      check('arrival', 94, ON_ARRIVAL),
      check(18, 93.8),
      {
        daysAgo: 4,
        before: 93.1,
        after: 94,
        checkedBy: 'Ines Operator',
        note: 'Damp in the windscreen, diaphragm wiped dry, adjusted. Check again within two weeks.',
      },
    ],
  },
  {
    serialNumber: 'M1-1965',
    class: 1,
    description: METER,
    microphone: 'Half-inch, 28802',
    stay: {
      code: 'MER-04',
      fromDaysAgo: null,
      toDaysAgo: SWAPPED_DAYS_AGO,
      note: 'Taken down for its periodic test in the laboratory',
    },
    checks: [check('arrival', 94.2, ON_ARRIVAL), check(SWAPPED_DAYS_AGO, 94.3, 'Before it was taken down')],
  },
  {
    serialNumber: 'M1-2230',
    class: 1,
    description: METER,
    microphone: 'Half-inch, 31402',
    stay: {
      code: 'MER-04',
      fromDaysAgo: SWAPPED_DAYS_AGO,
      toDaysAgo: null,
      note: 'In the place of M1-1965',
    },
    checks: [check('arrival', 94, ON_ARRIVAL)],
  },
  {
    serialNumber: 'M2-0814',
    class: 2,
    description: 'Logging sound level meter in a steel cabinet',
    microphone: 'Half-inch, 19077',
    stay: since('MER-05', 'Class 2: levels beside the haul road are far above its floor'),
    checks: [check('arrival', 94.2, ON_ARRIVAL), check(15, 94.3)],
  },
  {
    serialNumber: 'M1-2213',
    class: 1,
    description: METER,
    microphone: 'Half-inch, 31197',
    stay: since('MER-06'),
    checks: [check(356, 94, 'In the workshop, before it was put up')],
  },
  {
    serialNumber: 'M1-2214',
    class: 1,
    description: 'Logging sound level meter, low-noise outdoor set',
    microphone: 'One-inch, 7731',
    stay: since('MER-07'),
    checks: [check('arrival', 94, ON_ARRIVAL), check(18, 94)],
  },
  {
    serialNumber: 'M1-2240',
    class: 1,
    description: METER,
    microphone: 'Half-inch, 31411',
    stay: since('MER-08'),
    checks: [check('arrival', 93.9, ON_ARRIVAL)],
  },
];
