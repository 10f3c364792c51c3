import { listExceedances, type ExceedanceRow } from '#db/queries/exceedances';
import { newAcknowledgementSchema, type Cause } from '#lib/contracts/exceedances';
import { acknowledge } from '#lib/services/exceedances/acknowledge';

const WEEK_SEC = 7 * 86_400;
const MOST = 10_000;

interface Finding {
  cause: Cause;
  causeDetail: string | null;
  note: string;
}

const FAN: Finding[] = [
  {
    cause: 'plant',
    causeDetail: 'grain silo fan',
    note: '100 Hz third stands out all through the window. The silo’s shift leader was told by telephone.',
  },
  {
    cause: 'plant',
    causeDetail: 'grain silo fan',
    note: 'Aeration after a delivery, as the silo’s log has it. Asked to run it before 21:00.',
  },
  {
    cause: 'plant',
    causeDetail: 'grain silo fan',
    note: 'The same spectrum as the nights before. Goes into the letter to the silo’s operator.',
  },
];

/** What the operator found out, by station: told in turn, oldest exceedance first. */
const FINDINGS: Readonly<Record<string, Finding[]>> = {
  'MER-02': FAN,
  'MER-04': [
    { cause: 'people', causeDetail: 'playground', note: 'Break time; nothing of the port stands out.' },
    {
      cause: 'vehicles',
      causeDetail: 'coaches at the school gate',
      note: 'Engines left running for half an hour. The school has spoken to the drivers.',
    },
  ],
  'MER-05': [
    {
      cause: 'vehicles',
      causeDetail: 'haul lorries',
      note: 'More lorries than the consent foresees for a day; the quarry sends its gate log.',
    },
    {
      cause: 'vehicles',
      causeDetail: 'haul lorries',
      note: 'Tailboards banging on the empty run. The quarry checks the rubber stops.',
    },
  ],
  'MER-06': [
    { cause: 'rail', causeDetail: 'goods train', note: 'One passage, timed with the yard’s movements.' },
    {
      cause: 'vehicles',
      causeDetail: null,
      note: 'A single car passing close by; nothing that the network could act on.',
    },
  ],
  'MER-08': [{ cause: 'vessels', causeDetail: 'ferry', note: 'Ferry manoeuvring at the steps.' }],
};
const UNEXPLAINED: Finding[] = [
  { cause: 'not-found', causeDetail: null, note: 'Listened to the hours about it and found no cause.' },
];

/** Acknowledges what is older than a week, as the operator did who keeps the list short; the last week waits for somebody. */
export async function seedAcknowledgements(
  networkId: number,
  operatorId: string,
  nowSec: number,
): Promise<number> {
  const filter = { toSec: nowSec - WEEK_SEC, isAcknowledged: false };
  const older = await listExceedances(networkId, filter, { limit: MOST, after: null });
  for (const [turn, { id, ...exceedance }] of older.toReversed().entries()) {
    const given = newAcknowledgementSchema.parse(findingOf(exceedance, turn));
    const { kind } = await acknowledge({ networkId, id, userId: operatorId, given });
    if (kind !== 'acknowledged') throw new Error(`Exceedance ${id} could not be acknowledged: ${kind}.`);
  }
  return older.length;
}

function findingOf({ stationCode, metric }: Omit<ExceedanceRow, 'id'>, turn: number): Finding {
  const known = metric === 'bandLeq' ? FAN : (FINDINGS[stationCode] ?? UNEXPLAINED);
  const finding = known[turn % known.length];
  if (!finding) throw new Error(`There is no finding for ${stationCode}.`);
  return finding;
}
