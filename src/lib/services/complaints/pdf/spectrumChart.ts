import { bandByNominalHz, bandLabel } from '#lib/acoustics/bands';
import type { EvidenceContext } from '#lib/contracts/complaintEvidence';
import { INK, RULE } from '../../summaries/pdf/typography';
import { label, line, n, svg } from './svg';

const WIDTH = 470;
const HEIGHT = 165;
const LEFT = 30;
const TOP = 14;
const FOOT = HEIGHT - 30;
const STEP_DB = 10;
const BAR = '#a9bcae';
const BAR_OUT = '#3f6b50';

/** Bands as bars with ticks at the usual level; bands that stand out are darker. Null where no band has a level. */
export function spectrumChartSvg(context: EvidenceContext): string | null {
  const { bands, bandFraction, standingOut } = context;
  const levels = bands.flatMap(({ Leq, usual }) => [Leq, usual]).filter((level) => level !== null);
  if (levels.length === 0) return null;
  const lowDb = Math.floor((Math.min(...levels) - 3) / STEP_DB) * STEP_DB;
  const highDb = Math.ceil((Math.max(...levels) + 1) / STEP_DB) * STEP_DB;
  const y = (db: number) => FOOT - ((db - lowDb) / (highDb - lowDb)) * (FOOT - TOP);
  const slot = (WIDTH - LEFT) / bands.length;
  const parts: string[] = [];
  for (let db = lowDb; db <= highDb; db += STEP_DB) {
    parts.push(line(LEFT, y(db), WIDTH, y(db), RULE, 0.4), label(LEFT - 5, y(db) + 2.5, String(db), 'end'));
  }
  bands.forEach(({ nominalHz, Leq, usual }, at) => {
    const x = LEFT + at * slot;
    const band = bandByNominalHz(bandFraction, nominalHz);
    const isOut = standingOut.some(
      ({ fromHz, toHz }) =>
        band !== undefined && band.lowerHz >= fromHz * 0.999 && band.upperHz <= toHz * 1.001,
    );
    if (Leq !== null) {
      const colour = isOut ? BAR_OUT : BAR;
      parts.push(
        `<rect x="${n(x + slot * 0.16)}" y="${n(y(Leq))}" width="${n(slot * 0.68)}" height="${n(FOOT - y(Leq))}" fill="${colour}"/>`,
      );
    }
    if (usual !== null) {
      parts.push(
        line(x + slot * 0.06, y(usual), x + slot * 0.94, y(usual), '#ffffff', 2.4),
        line(x + slot * 0.06, y(usual), x + slot * 0.94, y(usual), INK, 1),
      );
    }
    if (band && (bandFraction === 1 || bands.length <= 12 || band.index % 3 === 0)) {
      const text = bandLabel(band).replace(' Hz', '').replace(' kHz', 'k');
      parts.push(label(x + slot / 2, FOOT + 11, text, 'middle'));
    }
  });
  parts.push(
    label(LEFT - 5, 8, 'dB', 'end'),
    label(WIDTH, HEIGHT - 4, 'Nominal mid-band frequency, Hz', 'end'),
  );
  return svg(WIDTH, HEIGHT, parts);
}
