import { type BandFraction } from '#lib/acoustics/bands';
import { type Weighting } from '#lib/acoustics/weighting';

/** How the bands' pictures are drawn; it lives in the address, so that the page can be sent on. */
export interface BandView {
  /** Reference curve over the octaves; null: none. */
  nr: number | null;
  fraction: BandFraction;
  weighting: Extract<Weighting, 'A' | 'Z'>;
}

export interface BandViewEntry {
  view: BandView;
  /** The curve as it was typed. */
  nrText: string;
  problem: string | null;
}

const HIGHEST_NR = 130;

/** Reads `?nr=35&bands=octaves&weighting=A`; a curve that cannot be read is told and not drawn. */
export function readBandView(query: URLSearchParams): BandViewEntry {
  const nrText = (query.get('nr') ?? '').trim().slice(0, 10);
  const isNumber = /^\d{1,3}$/.test(nrText) && Number(nrText) <= HIGHEST_NR;
  return {
    view: {
      nr: isNumber ? Number(nrText) : null,
      fraction: query.get('bands') === 'octaves' ? 1 : 3,
      weighting: query.get('weighting') === 'A' ? 'A' : 'Z',
    },
    nrText,
    problem:
      nrText === '' || isNumber ? null : `Give a whole number from 0 to ${HIGHEST_NR}, or leave it empty.`,
  };
}
