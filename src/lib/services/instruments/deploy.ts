import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import {
  findDeployment,
  insertDeployment,
  selectOverlapping,
  type DeploymentRow,
  type Stay,
} from '#db/queries/deployments';
import { findInstrument, lockInstrument } from '#db/queries/instruments';
import { findStation, lockStation } from '#db/queries/stations';
import { settingsAt } from '#db/queries/networks';
import { formatInstantUtc } from '#lib/contracts/common';
import { formatInstant } from '#lib/format/times';
import { MOST_DEPLOYMENT_AHEAD_SEC, type Deployment, type NewDeployment } from '#lib/contracts/instruments';
import { done, invalid, type Outcome } from '../outcome';
import { NO_INSTRUMENT } from './add';
import { deploymentJson } from './instrumentJson';

/** What was read before the locks were granted must not hide what others have committed meanwhile. */
export const SEES_COMMITTED = { isolationLevel: 'read committed' } as const;

interface Act {
  networkId: number;
  instrumentId: number;
  userId: string;
  nowSec: number;
}

/**
 * Notes that an instrument stands at a station. Refused where the station had another instrument, or the instrument stood
 * elsewhere, for any part of that time: a figure has one instrument.
 */
export function deploy(act: Act, input: NewDeployment): Promise<Outcome<Deployment>> {
  const { networkId, instrumentId, userId, nowSec } = act;
  return inTransaction<Outcome<Deployment>>(async (transaction) => {
    await lockInstrument(instrumentId, transaction);
    const instrument = await findInstrument(networkId, instrumentId, transaction);
    if (!instrument) return NO_INSTRUMENT;
    if (instrument.retiredAt) return invalid('', 'This instrument is retired: bring it back first.');
    const station = await findStation(networkId, input.station, transaction);
    if (!station) return invalid('station', 'is not a station of this network');
    await lockStation(station.id, transaction);
    const stay = { instrumentId, stationId: station.id, startSec: input.from, endSec: input.to };
    const problem = aheadOf(stay, nowSec) ?? (await overlapOf(stay, null, transaction));
    if (problem) return problem;
    const { note } = input;
    const id = await insertDeployment({ ...stay, networkId, note, createdBy: userId }, transaction);
    await appendAudit(
      {
        userId,
        networkId,
        action: 'deployment.add',
        subject: `instrument ${instrument.serialNumber}`,
        detail: { deployment: id, station: station.code, ...stayWords(stay), note },
      },
      transaction,
    );
    return done(deploymentJson(await readDeployment(instrumentId, id, transaction)));
  }, SEES_COMMITTED);
}

/** Refuses a stay that begins or ends further ahead than a visit is planned. */
export function aheadOf({ startSec, endSec }: Stay, nowSec: number): Outcome<never> | null {
  const latestSec = nowSec + MOST_DEPLOYMENT_AHEAD_SEC;
  if (startSec > latestSec) return invalid('from', 'is more than a week ahead');
  if (endSec !== null && endSec > latestSec) return invalid('to', 'is more than a week ahead');
  return null;
}

/** Refuses a stay that another one overlaps, and says which, in the network's time. */
export async function overlapOf(
  stay: Stay,
  exceptId: number | null,
  transaction: Connection,
): Promise<Outcome<never> | null> {
  const [other] = await selectOverlapping(stay, exceptId, transaction);
  if (!other) return null;
  const { timeZone } = await settingsAt(other.networkId, other.startSec, transaction);
  const words = (sec: number) => formatInstant(sec, timeZone);
  const since = `from ${words(other.startSec)}`;
  const until = other.endSec === null ? 'and is still there' : `to ${words(other.endSec)}`;
  return other.stationId === stay.stationId
    ? invalid(
        'from',
        `station ${other.stationCode} had instrument ${other.serialNumber} ${since} ${until}: end that stay first`,
      )
    : invalid(
        'from',
        `this instrument stood at station ${other.stationCode} ${since} ${until}: end that stay first`,
      );
}

/** A stay's ends for the audit. */
export function stayWords({ startSec, endSec }: Pick<Stay, 'startSec' | 'endSec'>) {
  return { from: formatInstantUtc(startSec), to: endSec === null ? null : formatInstantUtc(endSec) };
}

/** A deployment that must be there. */
export async function readDeployment(
  instrumentId: number,
  id: number,
  transaction: Connection,
): Promise<DeploymentRow> {
  const row = await findDeployment(instrumentId, id, transaction);
  if (!row) throw new Error(`There is no deployment ${id} of instrument ${instrumentId}.`);
  return row;
}
