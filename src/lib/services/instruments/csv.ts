import { listDeployments } from '#db/queries/deployments';
import { listInstruments } from '#db/queries/instruments';
import { formatInstantUtc } from '#lib/contracts/common';
import { groupBy } from '../groupBy';
import { csvText, type Cell } from '#lib/format/csvText';

const HEADER = [
  'serialNumber',
  'class',
  'description',
  'microphone',
  'retiredAt',
  'station',
  'from',
  'to',
  'note',
  'withdrawnBecause',
];

/** Every instrument of a network with its stays, one line a stay; an instrument that stood nowhere has one line, too. */
export async function instrumentsCsv(networkId: number): Promise<string> {
  const [instruments, deployments] = await Promise.all([
    listInstruments(networkId),
    listDeployments(networkId),
  ]);
  const byInstrument = groupBy(deployments, ({ instrumentId }) => instrumentId);
  const rows = instruments.flatMap((instrument): Cell[][] => {
    const { serialNumber, description, microphone, retiredAt } = instrument;
    const about = [serialNumber, instrument.class, description, microphone, retiredAt?.toISOString() ?? null];
    const stays = byInstrument.get(instrument.id)?.toReversed() ?? [];
    if (stays.length === 0) return [[...about, null, null, null, null, null]];
    return stays.map((stay) => [
      ...about,
      stay.stationCode,
      formatInstantUtc(stay.startSec),
      stay.endSec === null ? null : formatInstantUtc(stay.endSec),
      stay.note,
      stay.withdrawalReason,
    ]);
  });
  return csvText([HEADER, ...rows]);
}
