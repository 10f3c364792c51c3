import { bandByNominalHz } from '#lib/acoustics/bands';
import { formatInstantUtc } from '#lib/contracts/instants';
import { decodeSpectrogram, type SpectrogramColumns } from '#lib/contracts/spectrogramBinary';
import { type StripColumns } from '../model/stripColumns';
import { type Tile } from '../model/tiles';
import { fetchAnswer } from './fetchJson';

/** A tile's columns from the server. @throws {ServerRefusal} */
export async function fetchColumns(
  stationUrl: string,
  tile: Tile,
  columns: number,
  signal: AbortSignal,
): Promise<StripColumns> {
  const query = new URLSearchParams({
    from: formatInstantUtc(tile.fromSec),
    to: formatInstantUtc(tile.toSec),
    columns: String(columns),
    percentiles: 'A',
  });
  const headers = { Accept: 'application/octet-stream' };
  const answer = await fetchAnswer(`${stationUrl}/spectrogram?${query.toString()}`, { signal, headers });
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
