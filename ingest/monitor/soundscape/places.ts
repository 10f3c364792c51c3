import type { EVENT_SOURCES, STEADY_SOURCES } from './sources';

/** How loud each source is at a station: A-weighted level in dB at full strength. */
export interface Soundscape {
  code: string;
  /** A-weighted level that is left when everything is still. */
  floorDb: number;
  steadyDb: Partial<Record<keyof typeof STEADY_SOURCES, number>>;
  /** LAFmax of a typical event. */
  eventsDb: Partial<Record<keyof typeof EVENT_SOURCES, number>>;
}

/** The eight stations of the Merrow estuary. */
export const SOUNDSCAPES: Soundscape[] = [
  {
    code: 'MER-01',
    floorDb: 41,
    steadyDb: { reefers: 54, cranes: 63, siloFan: 44, tide: 43, traffic: 48 },
    eventsDb: { containerDrops: 79, ferry: 62 },
  },
  {
    code: 'MER-02',
    floorDb: 36,
    steadyDb: { siloFan: 53, traffic: 52, cranes: 50, reefers: 42 },
    eventsDb: { passingCars: 70, containerDrops: 62 },
  },
  {
    code: 'MER-03',
    floorDb: 35,
    steadyDb: { locomotive: 60, traffic: 50, reefers: 38 },
    eventsDb: { shunting: 82, nightTrain: 75, passingCars: 60 },
  },
  {
    code: 'MER-04',
    floorDb: 33,
    steadyDb: { traffic: 55, playground: 66, siloFan: 45, cranes: 44 },
    eventsDb: { passingCars: 72, shunting: 58 },
  },
  {
    code: 'MER-05',
    floorDb: 31,
    steadyDb: { crusher: 56, traffic: 44, dawnBirds: 44 },
    eventsDb: { haulTrucks: 80, passingCars: 58 },
  },
  {
    code: 'MER-06',
    floorDb: 32,
    steadyDb: { traffic: 51, siloFan: 38, dawnBirds: 43, locomotive: 42 },
    eventsDb: { bells: 78, passingCars: 68, nightTrain: 62 },
  },
  {
    code: 'MER-07',
    floorDb: 26,
    steadyDb: { dawnBirds: 50, tide: 37, reefers: 29, cranes: 34 },
    eventsDb: { ferry: 52 },
  },
  {
    code: 'MER-08',
    floorDb: 34,
    steadyDb: { tide: 46, traffic: 50, cranes: 47, reefers: 40 },
    eventsDb: { ferry: 74, passingCars: 64, containerDrops: 64 },
  },
];
