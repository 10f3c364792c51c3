import { bandRange, bandsOf, type Band, type BandFraction } from '#lib/acoustics/bands';
import { roundHalfUp } from '#lib/acoustics/rounding';
import { levelOfEnergyDb } from '#lib/acoustics/energy';
import { localClockAt } from './clock';
import type { Soundscape } from './places';
import { makeSynthesiser, type SynthesisedInterval } from './synthesise';
import { unitNoise } from './noise';

/** What a field monitor posts for one interval (the contract's record). */
export interface IntervalRecord {
  start: string;
  seconds: number;
  LAeq: number;
  LAFmax: number;
  LAFmin: number;
  LCeq: number;
  LCpeak: number;
  levels: number[];
  flags: string[];
  windSpeed: number | null;
  windDirection: number | null;
  temperature: number;
  battery: number;
}

export interface MonitorSetup {
  bandFraction: BandFraction;
  intervalSec: number;
  firstBandHz: number;
  lastBandHz: number;
  /** False: no wind and no rain is told; left out: it has one. */
  hasWeatherSensor?: boolean;
}

const THIRDS = bandsOf(3);

/** Makes a station's records: the same start always gives the same record. */
export function makeRecorder(
  soundscape: Soundscape,
  setup: MonitorSetup,
): (startSec: number) => IntervalRecord {
  const synthesise = makeSynthesiser(soundscape);
  const { hasWeatherSensor = true } = setup;
  const bands = bandRange(setup.bandFraction, setup.firstBandHz, setup.lastBandHz);
  return (startSec) => {
    const heard = synthesise(startSec, setup.intervalSec);
    const isCheck = isCalibrationCheck(soundscape.code, startSec);
    const { weather } = heard;
    return {
      start: new Date(startSec * 1000).toISOString().replace('.000Z', 'Z'),
      seconds: setup.intervalSec,
      LAeq: oneDecimal(isCheck ? 94 : heard.laeqDb),
      LAFmax: oneDecimal(isCheck ? 94.1 : heard.lafmaxDb),
      LAFmin: oneDecimal(isCheck ? 93.8 : heard.lafminDb),
      LCeq: oneDecimal(isCheck ? 94 : heard.lceqDb),
      LCpeak: oneDecimal(isCheck ? 97.1 : heard.lcpeakDb),
      levels: bands.map((band) => oneDecimal(isCheck && band.nominalHz === 1000 ? 94 : levelOf(band, heard))),
      flags: [
        ...(isCheck ? ['calibration'] : []),
        ...(hasWeatherSensor && weather.isRaining ? ['rain'] : []),
      ],
      windSpeed: hasWeatherSensor ? oneDecimal(weather.windSpeedMs) : null,
      windDirection: hasWeatherSensor ? Math.floor(weather.windDirectionDeg) : null,
      temperature: oneDecimal(weather.temperatureC),
      battery: oneDecimal(
        12.3 + 0.5 * Math.max(0, Math.sin(((localClockAt(startSec).hour - 7) / 12) * Math.PI)),
      ),
    };
  };
}

/** A technician's check with the calibrator: two minutes at ten on one weekday morning a month. */
function isCalibrationCheck(code: string, startSec: number): boolean {
  const { hour, weekday } = localClockAt(startSec);
  if (hour < 10 || hour >= 10 + 2 / 60 || weekday > 4) return false;
  const day = Math.floor(startSec / 86_400);
  return unitNoise(code.charCodeAt(code.length - 1), day) < 1 / 21;
}

function levelOf(band: Band, heard: SynthesisedInterval): number {
  const slot = THIRDS.findIndex((third) => third.index === band.index);
  if (band.fraction === 3) return heard.thirdsDb[slot] ?? 0;
  const members = [slot - 1, slot, slot + 1].map((at) => 10 ** ((heard.thirdsDb[at] ?? -100) / 10));
  return levelOfEnergyDb(members.reduce((sum, energy) => sum + energy, 0)) ?? 0;
}

function oneDecimal(value: number): number {
  return roundHalfUp(value, 1);
}
