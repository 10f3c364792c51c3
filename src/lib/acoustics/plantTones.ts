/** What of a machine tells the frequencies that it makes; null = not known or not applicable. */
export interface Machine {
  /** Lowest and highest speed of rotation in revolutions a minute; equal where it is fixed. */
  minRpm: number | null;
  maxRpm: number | null;
  /** Blades of a fan, vanes of a pump, lobes of a blower. */
  blades: number | null;
  /** Poles of its motor, an even number. */
  poles: number | null;
  cylinders: number | null;
  strokes: 2 | 4 | null;
  mainsHz: number | null;
  /** A frequency that is known for itself, as of a warning signal. */
  toneHz: number | null;
}

export type LineSource = 'blade-pass' | 'firing' | 'mains' | 'own-tone' | 'shaft';

/** One line of a machine's spectrum; a speed range makes it a range of frequencies. */
export interface PlantLine {
  source: LineSource;
  /** 1 is the fundamental. */
  harmonic: number;
  fromHz: number;
  toHz: number;
}

/** Harmonics that are looked for: those that are commonly strong. */
const HARMONICS: Readonly<Record<LineSource, number>> = {
  'blade-pass': 4,
  firing: 4,
  mains: 6,
  'own-tone': 3,
  shaft: 3,
};

/** Greatest slip of an induction motor under load against its synchronous speed (common practice: 1–4 %). */
const MOST_SLIP = 0.04;

/**
 * Rotation in Hz, lowest and highest: n/60 of the noted speed, else the synchronous speed 2f/p of a motor with p poles at f mains
 * (120·f/p in rpm), less a slip of up to 4 %; null when neither is known.
 */
export function rotationHz(machine: Machine): { fromHz: number; toHz: number } | null {
  const { minRpm, maxRpm, poles, mainsHz } = machine;
  if (minRpm !== null && maxRpm !== null) return { fromHz: minRpm / 60, toHz: maxRpm / 60 };
  if (poles === null || mainsHz === null) return null;
  const synchronousHz = (2 * mainsHz) / poles;
  return { fromHz: synchronousHz * (1 - MOST_SLIP), toHz: synchronousHz };
}

/**
 * Lines that a machine is expected to make, in Hz: shaft n/60; blade-pass z·n/60; firing c·n/120 for four strokes and c·n/60 for
 * two; magnetic hum at twice the mains frequency; each with its harmonics. Source: common practice of machine noise (such as Bies
 * and Hansen, Engineering Noise Control; from memory); how many harmonics are looked for is Bittern's own choice.
 */
export function plantLines(machine: Machine): PlantLine[] {
  const { blades, cylinders, strokes, mainsHz, toneHz } = machine;
  const rotation = rotationHz(machine);
  const lines: PlantLine[] = [];
  const add = (source: LineSource, factor: number, base: { fromHz: number; toHz: number } | null) => {
    if (!base) return;
    for (let harmonic = 1; harmonic <= HARMONICS[source]; harmonic += 1) {
      const times = factor * harmonic;
      lines.push({ source, harmonic, fromHz: base.fromHz * times, toHz: base.toHz * times });
    }
  };
  if (blades !== null) add('blade-pass', blades, rotation);
  if (cylinders !== null) add('firing', cylinders / (strokes === 2 ? 1 : 2), rotation);
  if (mainsHz !== null) add('mains', 2, { fromHz: mainsHz, toHz: mainsHz });
  if (toneHz !== null) add('own-tone', 1, { fromHz: toneHz, toHz: toneHz });
  add('shaft', 1, rotation);
  return lines;
}
