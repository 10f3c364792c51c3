import type { LineSource, Machine, PlantLine } from '#lib/acoustics/plantTones';
import { rotationHz } from '#lib/acoustics/plantTones';

const DAYS = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'];
const ORDINALS = ['', '', '2nd', '3rd', '4th', '5th', '6th'];

const LINE_SOURCE_WORDS: Readonly<Record<LineSource, string>> = {
  'blade-pass': 'blade-pass',
  firing: 'firing frequency',
  mains: 'hum at twice the mains frequency',
  'own-tone': 'own tone',
  shaft: 'shaft rotation',
};

/** A frequency or a range of them: "25 Hz", "24.2–25 Hz"; four digits at most. */
export function formatHzRange(fromHz: number, toHz: number): string {
  const [from, to] = [digits(fromHz), digits(toHz)];
  return from === to ? `${from} Hz` : `${from}–${to} Hz`;
}

function digits(hz: number): string {
  return String(Number(hz.toPrecision(4)));
}

/** How a machine makes a line: "25 Hz × 4 blades = 100 Hz", "2 × 50 Hz mains × 3 = 300 Hz". */
export function lineFormula(machine: Machine, line: PlantLine): string {
  const rotation = rotationHz(machine);
  const turn = rotation ? formatHzRange(rotation.fromHz, rotation.toHz) : '';
  const times = line.harmonic > 1 ? ` × ${line.harmonic}` : '';
  const result = formatHzRange(line.fromHz, line.toHz);
  switch (line.source) {
    case 'blade-pass':
      return `${turn} × ${machine.blades} blades${times} = ${result}`;
    case 'firing': {
      const strokes = machine.strokes === 2 ? ' (two-stroke)' : ' ÷ 2 (four-stroke)';
      return `${turn} × ${machine.cylinders} cylinders${strokes}${times} = ${result}`;
    }
    case 'mains':
      return `2 × ${digits(machine.mainsHz ?? 0)} Hz mains${times} = ${result}`;
    case 'own-tone':
      return times ? `${digits(machine.toneHz ?? 0)} Hz${times} = ${result}` : result;
    case 'shaft':
      return times ? `${turn}${times} = ${result}` : result;
  }
}

/** What a line is: "blade-pass", "2nd harmonic of the blade-pass". */
export function lineName({ source, harmonic }: PlantLine): string {
  const words = LINE_SOURCE_WORDS[source];
  return harmonic === 1 ? words : `${ORDINALS[harmonic] ?? `${harmonic}th`} harmonic of the ${words}`;
}

/** When a plant is scheduled: "Mon–Fri 21:00–06:00", "every day", "Mon, Wed 07:00–12:00". `weekdays`: bit 0 is Monday. */
export function scheduleWords(weekdays: number, clock: { from: string | null; to: string | null }): string {
  const days = DAYS.map((_, bit) => bit).filter((bit) => (weekdays & (1 << bit)) !== 0);
  const hours = clock.from === null || clock.to === null ? '' : ` ${clock.from}–${clock.to}`;
  return `${dayWords(days)}${hours}`;
}

function dayWords(days: readonly number[]): string {
  if (days.length === DAYS.length) return 'every day';
  const first = days[0] ?? 0;
  const last = days.at(-1) ?? 0;
  const isRun = days.length > 2 && last - first === days.length - 1;
  return isRun ? `${DAYS[first]}–${DAYS[last]}` : days.map((day) => DAYS[day]).join(', ');
}
