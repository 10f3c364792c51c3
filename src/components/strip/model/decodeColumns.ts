import { bandByNominalHz } from '#lib/acoustics/bands';
import { decodeSpectrogram } from '#lib/contracts/spectrogramBinary';
import { type StripColumns } from './stripColumns';

/** A tile's columns out of the server's binary answer. */
export function decodeColumns(answer: ArrayBuffer): StripColumns {
  const spectrogram = decodeSpectrogram(answer);
  const { header } = spectrogram;
  return {
    fromSec: header.from,
    stepSec: header.stepSeconds,
    count: header.columns,
    bands: header.bands.flatMap((hz) => bandByNominalHz(header.bandFraction, hz) ?? []),
    laeqCentiDb: spectrogram.laeqCentiDb,
    lafmaxCentiDb: spectrogram.lafmaxCentiDb,
    presentSec: spectrogram.presentSec,
    validSec: spectrogram.validSec,
    lateSec: spectrogram.lateSec,
    reasonBits: spectrogram.reasonBits,
    flagBits: spectrogram.flagBits,
    levelsCentiDb: spectrogram.levelsCentiDb,
    percentiles: spectrogram.percentiles,
  };
}
