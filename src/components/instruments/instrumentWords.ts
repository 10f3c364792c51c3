/** Field → what its label says, for the summary of errors. */
export const INSTRUMENT_LABELS = {
  serialNumber: 'Serial number',
  class: 'Class',
  description: 'What it is',
  microphone: 'Microphone',
  reason: 'Reason',
  retired: 'Retire',
  station: 'Station',
  from: 'Stands there from',
  to: 'Until',
  note: 'Note',
} as const;

/** Seconds of an instant as the interface gives it. */
export const secOf = (instant: string) => Math.floor(Date.parse(instant) / 1000);
