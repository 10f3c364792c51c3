import { between, type LocalClock } from './clock';
import { smoothNoise, unitNoise } from './noise';

/** A steady part of the soundscape: relative energy 0…, 1 at full strength. */
export interface SteadySource {
  name: string;
  seed: number;
  spectrum: SpectrumShape;
  strength(clock: LocalClock, epochSec: number): number;
}

/** A source of single events: passes, bangs, calls. */
export interface EventSource {
  name: string;
  seed: number;
  spectrum: SpectrumShape;
  /** Typical length of one event. */
  durationSec: number;
  /** Expected events a minute. */
  rate(clock: LocalClock): number;
}

/** Broad spectrum: level falls by `slopeDbPerOctave` either side of `peakHz`; lines stand out in single thirds. */
export interface SpectrumShape {
  peakHz: number;
  slopeBelowDb: number;
  slopeAboveDb: number;
  lines?: { hz: number; aboveDb: number }[];
}

const isWeekday = (clock: LocalClock) => clock.weekday < 5;
const rush = (hour: number) => Math.exp(-((hour - 8) ** 2) / 2) + Math.exp(-((hour - 17.3) ** 2) / 3);

const traffic: SteadySource = {
  name: 'town traffic',
  seed: 101,
  spectrum: { peakHz: 80, slopeBelowDb: 4, slopeAboveDb: 3 },
  strength: (clock, at) => {
    const daily = 0.02 + 0.5 * between(clock.hour, 6, 22) + 0.75 * rush(clock.hour);
    return daily * (isWeekday(clock) ? 1 : 0.45) * (1 + 0.2 * smoothNoise(102, at, 420));
  },
};

const reefers: SteadySource = {
  name: 'reefer stack',
  seed: 111,
  spectrum: { peakHz: 125, slopeBelowDb: 9, slopeAboveDb: 4.5, lines: [{ hz: 200, aboveDb: 6 }] },
  strength: (_, at) => 0.6 + 0.4 * smoothNoise(112, at, 40 * 3600),
};

const cranes: SteadySource = {
  name: 'quay cranes',
  seed: 121,
  spectrum: { peakHz: 400, slopeBelowDb: 3, slopeAboveDb: 4 },
  strength: (clock, at) => {
    const isShipAlongside = unitNoise(122, Math.floor(at / 43_200)) < (isWeekday(clock) ? 0.75 : 0.4);
    return isShipAlongside
      ? 0.15 + between(clock.hour, 6, 22) * (0.7 + 0.5 * smoothNoise(123, at, 900))
      : 0.02;
  },
};

/** 1,480 rpm on four blades: 98.7 Hz, in the 100 Hz third; runs on weekday nights while grain is aired. */
const siloFan: SteadySource = {
  name: 'grain silo fan',
  seed: 131,
  spectrum: {
    peakHz: 100,
    slopeBelowDb: 12,
    slopeAboveDb: 7,
    lines: [
      { hz: 100, aboveDb: 19 },
      { hz: 200, aboveDb: 8 },
    ],
  },
  strength: (clock) => {
    const isNightOfWeekday = clock.hour >= 12 ? clock.weekday < 5 : clock.weekday >= 1 && clock.weekday <= 5;
    return isNightOfWeekday ? between(clock.hour, 21.5, 5.25) : 0;
  },
};

const locomotive: SteadySource = {
  name: 'yard locomotive',
  seed: 141,
  spectrum: { peakHz: 63, slopeBelowDb: 6, slopeAboveDb: 3.5 },
  strength: (clock, at) =>
    between(clock.hour, 4.5, 23.5) *
    (unitNoise(142, Math.floor(at / 1500)) < 0.35 ? 1 : 0.06) *
    (isWeekday(clock) ? 1 : 0.3),
};

const crusher: SteadySource = {
  name: 'quarry crusher',
  seed: 151,
  spectrum: { peakHz: 160, slopeBelowDb: 3.5, slopeAboveDb: 4 },
  strength: (clock, at) => {
    const shift = isWeekday(clock)
      ? between(clock.hour, 7, 17)
      : clock.weekday === 5
        ? between(clock.hour, 7, 12)
        : 0;
    return shift * (0.8 + 0.3 * smoothNoise(152, at, 1200));
  },
};

const playground: SteadySource = {
  name: 'playground',
  seed: 161,
  spectrum: { peakHz: 1250, slopeBelowDb: 6, slopeAboveDb: 6 },
  strength: (clock) =>
    isWeekday(clock)
      ? between(clock.hour, 8.4, 9) +
        between(clock.hour, 10.5, 10.9) +
        between(clock.hour, 12.2, 13.2) +
        between(clock.hour, 15.1, 15.6)
      : 0,
};

const dawnBirds: SteadySource = {
  name: 'marsh birds',
  seed: 171,
  spectrum: { peakHz: 3150, slopeBelowDb: 11, slopeAboveDb: 9 },
  strength: (clock, at) =>
    0.03 +
    (between(clock.hour, 4.6, 8) + 0.35 * between(clock.hour, 17, 20)) *
      (0.7 + 0.6 * smoothNoise(172, at, 300)),
};

const tide: SteadySource = {
  name: 'water',
  seed: 181,
  spectrum: { peakHz: 500, slopeBelowDb: 3, slopeAboveDb: 3 },
  strength: (_, at) => 0.5 + 0.45 * Math.sin((at / 44_714) * 2 * Math.PI),
};

const ferry: EventSource = {
  name: 'ferry',
  seed: 201,
  spectrum: { peakHz: 50, slopeBelowDb: 6, slopeAboveDb: 3.5 },
  durationSec: 50,
  rate: (clock) =>
    between(clock.hour, 6, 22.5) * Math.floor((clock.hour * 60) % 30) < 3
      ? 0.6 * between(clock.hour, 6, 22.5)
      : 0,
};

const shunting: EventSource = {
  name: 'shunting',
  seed: 211,
  spectrum: { peakHz: 630, slopeBelowDb: 3, slopeAboveDb: 4 },
  durationSec: 2,
  rate: (clock) => 0.22 * between(clock.hour, 4.5, 23.5) * (isWeekday(clock) ? 1 : 0.35),
};

const haulTrucks: EventSource = {
  name: 'haul trucks',
  seed: 221,
  spectrum: { peakHz: 100, slopeBelowDb: 4, slopeAboveDb: 3.5 },
  durationSec: 16,
  rate: (clock) =>
    isWeekday(clock)
      ? 0.75 * between(clock.hour, 6.7, 17.2)
      : clock.weekday === 5
        ? 0.3 * between(clock.hour, 7, 12)
        : 0,
};

const containerDrops: EventSource = {
  name: 'container drops',
  seed: 231,
  spectrum: { peakHz: 250, slopeBelowDb: 3, slopeAboveDb: 4 },
  durationSec: 2,
  rate: (clock) => 0.12 + 0.35 * between(clock.hour, 6, 22),
};

const passingCars: EventSource = {
  name: 'passing cars',
  seed: 241,
  spectrum: { peakHz: 800, slopeBelowDb: 3.5, slopeAboveDb: 4 },
  durationSec: 7,
  rate: (clock) => 0.05 + 0.6 * between(clock.hour, 6, 23) + 1.2 * rush(clock.hour),
};

const bells: EventSource = {
  name: 'chapel bell',
  seed: 251,
  spectrum: { peakHz: 630, slopeBelowDb: 10, slopeAboveDb: 7, lines: [{ hz: 630, aboveDb: 9 }] },
  durationSec: 40,
  rate: (clock) => (clock.weekday === 6 ? 0.95 * between(clock.hour, 9.6, 10.15) : 0),
};

const nightTrain: EventSource = {
  name: 'night freight train',
  seed: 261,
  spectrum: { peakHz: 80, slopeBelowDb: 3, slopeAboveDb: 3 },
  durationSec: 55,
  rate: (clock) => 0.02 * between(clock.hour, 23, 5),
};

export const STEADY_SOURCES = {
  traffic,
  reefers,
  cranes,
  siloFan,
  locomotive,
  crusher,
  playground,
  dawnBirds,
  tide,
};
export const EVENT_SOURCES = { ferry, shunting, haulTrucks, containerDrops, passingCars, bells, nightTrain };
