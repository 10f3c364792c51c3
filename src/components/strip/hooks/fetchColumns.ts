import { bandByNominalHz } from '#lib/acoustics/bands';
import { decodeSpectrogram, type SpectrogramColumns } from '#lib/contracts/spectrogramBinary';
import { COLUMNS_HEADERS, columnsUrl } from '../model/columnsRequest';
import { type StripColumns } from '../model/stripColumns';
import { type Tile } from '../model/tiles';
import { takeEarlyAnswer } from './earlyAnswers';
import { fetchAnswer } from './fetchJson';

/** A tile's columns from the server. @throws {ServerRefusal} */
export async function fetchColumns(
  stationUrl: string,
  tile: Tile,
  signal: AbortSignal,
  columns?: number,
): Promise<StripColumns> {
  const url = columnsUrl(stationUrl, tile, columns);
  const answer =
    (await takeEarlyAnswer(url)) ?? (await fetchAnswer(url, { signal, headers: COLUMNS_HEADERS }));
  return columnsOf(decodeSpectrogram(await answer.arrayBuffer()));
}

function columnsOf(spectrogram: SpectrogramColumns): StripColumns {
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
