import { type SpectrumSearchAnswer } from '#lib/contracts/spectrumSearch';
import { Handover } from '../handover';

/** Spectra found for pages that come back for them. */
export const foundSpectra = new Handover<SpectrumSearchAnswer>();
