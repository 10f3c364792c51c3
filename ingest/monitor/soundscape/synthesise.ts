import { bandsOf, type Band } from '#lib/acoustics/bands';
import { aWeightDb, cWeightDb } from '#lib/acoustics/weighting';
import { localClockAt, type LocalClock } from './clock';
import { normalNoise, unitNoise } from './noise';
import {
  EVENT_SOURCES,
  STEADY_SOURCES,
  type EventSource,
  type SpectrumShape,
  type SteadySource,
} from './sources';
import type { Soundscape } from './places';
import { weatherAt, type Weather } from './weather';

/** What an interval sounded like at the microphone: levels in dB, thirds in the order of `bandsOf(3)`. */
export interface SynthesisedInterval {
  laeqDb: number;
  lafmaxDb: number;
  lafminDb: number;
  lceqDb: number;
  lcpeakDb: number;
  thirdsDb: Float64Array;
  weather: Weather;
}

const THIRDS = bandsOf(3);
const A_FACTOR = THIRDS.map((band) => 10 ** (aWeightDb(band.exactHz) / 10));
const C_FACTOR = THIRDS.map((band) => 10 ** (cWeightDb(band.exactHz) / 10));

const FLOOR: SpectrumShape = { peakHz: 63, slopeBelowDb: 2, slopeAboveDb: 3.2 };
const WIND_NOISE: SpectrumShape = { peakHz: 12.5, slopeBelowDb: 0, slopeAboveDb: 4.5 };
const RAIN_NOISE: SpectrumShape = { peakHz: 4000, slopeBelowDb: 4, slopeAboveDb: 3 };

/** Makes the intervals of one station: any start, any length; the same call gives the same interval. */
export function makeSynthesiser(
  soundscape: Soundscape,
): (startSec: number, seconds: number) => SynthesisedInterval {
  const seed = seedOf(soundscape.code);
  const floor = energiesOf(FLOOR, soundscape.floorDb);
  const wind = energiesOf(WIND_NOISE, 26);
  const rain = energiesOf(RAIN_NOISE, 43);
  const steady = Object.entries(soundscape.steadyDb).map(([name, levelDb]) => {
    const source: SteadySource = STEADY_SOURCES[name as keyof typeof STEADY_SOURCES];
    return { source, energies: energiesOf(source.spectrum, levelDb) };
  });
  const events = Object.entries(soundscape.eventsDb).map(([name, levelDb]) => {
    const source: EventSource = EVENT_SOURCES[name as keyof typeof EVENT_SOURCES];
    return { source, energies: energiesOf(source.spectrum, levelDb) };
  });
  const total = new Float64Array(THIRDS.length);

  return (startSec, seconds) => {
    const middleSec = startSec + seconds / 2;
    const clock = localClockAt(middleSec);
    const weather = weatherAt(middleSec);
    total.set(floor);
    addScaled(total, wind, 10 ** (weather.windSpeedMs * 0.33));
    if (weather.isRaining) addScaled(total, rain, 1);
    for (const { source, energies } of steady) addScaled(total, energies, source.strength(clock, middleSec));
    const steadyA = weightedSum(total, A_FACTOR);
    let peakA = 0;
    for (const { source, energies } of events) {
      const { meanShare, peakShare } = sharesOfEvents(source, seed, clock, startSec, seconds);
      if (meanShare === 0) continue;
      addScaled(total, energies, meanShare);
      peakA = Math.max(peakA, peakShare * weightedSum(energies, A_FACTOR));
    }
    return finish(total, steadyA, peakA, seed, startSec, seconds, weather);
  };
}

function finish(
  total: Float64Array,
  steadyA: number,
  peakA: number,
  seed: number,
  startSec: number,
  seconds: number,
  weather: Weather,
): SynthesisedInterval {
  const thirdsDb = new Float64Array(THIRDS.length);
  const spreadDb = seconds >= 60 ? 0.7 : 1.6;
  for (let slot = 0; slot < thirdsDb.length; slot += 1) {
    const energy = (total[slot] ?? 0) * 10 ** ((spreadDb * normalNoise(seed + slot, startSec)) / 10);
    total[slot] = energy;
    thirdsDb[slot] = 10 * Math.log10(energy);
  }
  const laeqDb = 10 * Math.log10(weightedSum(total, A_FACTOR));
  const lceqDb = 10 * Math.log10(weightedSum(total, C_FACTOR));
  const ripple = unitNoise(seed + 991, startSec);
  const lafmaxDb = Math.max(laeqDb + 0.6 + 4 * ripple * ripple, 10 * Math.log10(steadyA + peakA));
  return {
    laeqDb,
    lafmaxDb,
    lafminDb: Math.min(laeqDb - 0.4, 10 * Math.log10(steadyA) - 1 - 2 * ripple),
    lceqDb,
    lcpeakDb: Math.max(lafmaxDb, lceqDb) + 9 + 5 * ripple,
    thirdsDb,
    weather,
  };
}

/** Mean and greatest share of full strength that a source's events have in an interval. */
function sharesOfEvents(
  source: EventSource,
  stationSeed: number,
  clock: LocalClock,
  startSec: number,
  seconds: number,
) {
  const endSec = startSec + seconds;
  const rate = source.rate(clock);
  let weightedSec = 0;
  let peakShare = 0;
  const firstMinute = Math.floor((startSec - source.durationSec) / 60);
  for (let minute = firstMinute; minute * 60 < endSec; minute += 1) {
    const seed = source.seed + stationSeed;
    if (unitNoise(seed, minute) >= rate) continue;
    const beginsSec = minute * 60 + Math.floor(unitNoise(seed + 1, minute) * 60);
    const lengthSec = Math.max(1, Math.round(source.durationSec * (0.6 + 0.8 * unitNoise(seed + 2, minute))));
    const overlapSec = Math.min(endSec, beginsSec + lengthSec) - Math.max(startSec, beginsSec);
    if (overlapSec <= 0) continue;
    const rarity = unitNoise(seed + 4, minute) ** 9;
    const share = 10 ** (-1.1 * unitNoise(seed + 3, minute) + 0.8 * rarity);
    weightedSec += share * 0.35 * overlapSec;
    peakShare = Math.max(peakShare, share);
  }
  return { meanShare: weightedSec / seconds, peakShare };
}

/** Energies of the thirds for a shape whose A-weighted sum is `levelDb`. */
function energiesOf(shape: SpectrumShape, levelDb: number): Float64Array {
  const energies = Float64Array.from(THIRDS, (band) => 10 ** (shapeDb(shape, band) / 10));
  const scale = 10 ** (levelDb / 10) / weightedSum(energies, A_FACTOR);
  return energies.map((energy) => energy * scale);
}

function shapeDb(shape: SpectrumShape, band: Band): number {
  const octaves = Math.log2(band.exactHz / shape.peakHz);
  const broadDb = octaves < 0 ? octaves * shape.slopeBelowDb : -octaves * shape.slopeAboveDb;
  const line = shape.lines?.find(({ hz }) => band.lowerHz <= hz && hz < band.upperHz);
  return broadDb + (line?.aboveDb ?? 0);
}

function addScaled(total: Float64Array, energies: Float64Array, factor: number): void {
  if (factor <= 0) return;
  for (let slot = 0; slot < total.length; slot += 1)
    total[slot] = (total[slot] ?? 0) + factor * (energies[slot] ?? 0);
}

function weightedSum(energies: Float64Array, factors: number[]): number {
  let sum = 0;
  for (let slot = 0; slot < energies.length; slot += 1) sum += (energies[slot] ?? 0) * (factors[slot] ?? 0);
  return sum;
}

function seedOf(code: string): number {
  return [...code].reduce((seed, letter) => (seed * 31 + letter.charCodeAt(0)) | 0, 17);
}
