import { type FigureRow } from '#lib/contracts/figureSheet';
import { type Incident } from '#lib/contracts/levels';
import { formatDifferenceDb } from '#lib/format/levels';
import { stretchWords } from '#lib/format/placements';
import { type PeriodFigures } from '../levels/figures';
import { figureRow } from './figureRow';

/** LAeq of the incident sound, where a façade's reflection was taken off in any part of the period. */
export function facadeRows(incident: Incident, figures: PeriodFigures, timeZone: string): FigureRow[] {
  if (incident.placements.every(({ correction }) => correction === 0)) return [];
  return [
    figureRow(
      {
        key: 'LAeqIncident',
        name: 'LAeq of the incident sound',
        value: incident.LAeq,
        convention: `Measured level with the façade’s correction, ${correctionWords(incident, timeZone)} (Directive 2002/49/EC Annex I).`,
        note: 'Every other figure is as measured.',
        ifMissing: 'No valid data in this period.',
      },
      figures,
    ),
  ];
}

/** How the microphone stood in the period: "at a façade", "free field until 3 Mar 10:00, then at a façade". */
export function placementWords({ placements }: Incident, timeZone: string): string {
  return stretchWords(placements, timeZone, ({ placement }) =>
    placement === 'facade' ? 'at a façade' : 'free field',
  );
}

function correctionWords({ placements }: Incident, timeZone: string): string {
  return stretchWords(placements, timeZone, ({ correction }) => `${formatDifferenceDb(correction)} dB`);
}
