import { operatorAddresses } from '#db/queries/calibrationSettings';
import { inTransaction } from '#db/queries/connection';
import {
  endTrouble,
  insertTrouble,
  listOpenTroubles,
  updateTrouble,
  type TroubleRow,
} from '#db/queries/health';
import { listHealthSettings } from '#db/queries/healthSettings';
import { listNetworks, settingsAt, type NetworkRow } from '#db/queries/networks';
import { listClocks } from '#db/queries/stationClocks';
import { listLatest } from '#db/queries/stationLatest';
import { listStations, type StationRow } from '#db/queries/stations';
import { log } from '#lib/config/log';
import { type TroubleKind } from '#lib/contracts/health';
import { type Finding } from '#lib/services/health/evidence';
import { judgeStation } from '#lib/services/health/judge';
import { readEvidence } from '#lib/services/health/readEvidence';
import { thresholdsFor } from '#lib/services/health/thresholds';
import { putNotes } from './mail';
import { beginNote, overNote } from './troubleNote';

/** A trouble is over when it has seemed so for this long: what comes and goes is told once. */
const SETTLED_AFTER_SEC = 600;

interface Watch {
  network: NetworkRow;
  zone: string;
  recipients: string[];
  nowSec: number;
}

/**
 * Judges every station in use and keeps what is wrong: one message a trouble when it begins and one when it is over. Safe to run
 * twice and on two machines: a station has at most one open trouble of a kind.
 * @returns how many began or were over.
 */
export async function watchStations(now: Date): Promise<number> {
  let changes = 0;
  for (const network of await listNetworks()) changes += await watchNetwork(network, now);
  return changes;
}

async function watchNetwork(network: NetworkRow, now: Date): Promise<number> {
  const nowSec = Math.floor(now.getTime() / 1000);
  const [stations, latest, clocks, rows, open, { timeZone }] = await Promise.all([
    listStations(network.id),
    listLatest(network.id),
    listClocks(network.id),
    listHealthSettings(network.id),
    listOpenTroubles(network.id),
    settingsAt(network.id, nowSec),
  ]);
  const named = rows.find(({ stationId }) => stationId === 0)?.recipients ?? [];
  const recipients = named.length > 0 ? named : await operatorAddresses(network.id);
  const watch = { network, zone: timeZone, recipients, nowSec };
  let changes = 0;
  for (const station of stations) {
    const ofStation = open.filter(({ stationId }) => stationId === station.id);
    if (station.retiredAt) {
      for (const trouble of ofStation) await endTroubleOf(trouble, nowSec);
      continue;
    }
    const known = {
      station,
      latest: latest.find(({ stationId }) => stationId === station.id),
      clock: clocks.find(({ stationId }) => stationId === station.id),
      thresholds: thresholdsFor(station.id, rows),
      nowSec,
    };
    try {
      const openSince = new Map(ofStation.map(({ kind, beginsAtSec }) => [kind, beginsAtSec]));
      const findings = judgeStation(await readEvidence(known), openSince);
      for (const [kind, finding] of findings) {
        const trouble = ofStation.find((one) => one.kind === kind);
        if (await follow(watch, station, kind, finding, trouble)) changes += 1;
      }
    } catch (error) {
      // One station's trouble must not hide another's.
      log().error({ err: error, station: station.code }, 'health of a station could not be judged');
    }
  }
  return changes;
}

/** Whether a trouble began or was over. */
async function follow(
  watch: Watch,
  station: StationRow,
  kind: TroubleKind,
  finding: Finding,
  open: TroubleRow | undefined,
): Promise<boolean> {
  if (finding.state === 'unknown') return false;
  if (finding.state === 'bad') {
    if (!open) return begin(watch, station, kind, finding);
    await keep(open, { ...finding, fineSinceSec: null });
    return false;
  }
  if (!open) return false;
  const fineSinceSec = open.fineSinceSec ?? watch.nowSec;
  if (watch.nowSec - fineSinceSec >= SETTLED_AFTER_SEC) return end(watch, open, fineSinceSec);
  await keep(open, { ...open, fineSinceSec });
  return false;
}

function begin(
  { network, zone, recipients }: Watch,
  station: StationRow,
  kind: TroubleKind,
  { sinceSec, measured, bound }: Extract<Finding, { state: 'bad' }>,
): Promise<boolean> {
  const trouble = {
    networkId: network.id,
    stationId: station.id,
    kind,
    beginsAtSec: sinceSec,
    measured,
    bound,
  };
  return inTransaction(async (transaction) => {
    const id = await insertTrouble(trouble, transaction);
    if (id === null) return false;
    const note = beginNote({ ...trouble, kind, station }, network, zone);
    const cause = { networkId: network.id, kind: 'health', key: `${id}:began` };
    await putNotes(note, cause, recipients, transaction);
    return true;
  });
}

function end({ network, zone, recipients }: Watch, open: TroubleRow, endsAtSec: number): Promise<boolean> {
  return inTransaction(async (transaction) => {
    if (!(await endTrouble(open.id, endsAtSec, transaction))) return false;
    const cause = { networkId: network.id, kind: 'health', key: `${open.id}:over` };
    await putNotes(overNote(open, endsAtSec, network, zone), cause, recipients, transaction);
    return true;
  });
}

async function keep(
  open: TroubleRow,
  { measured, bound, fineSinceSec }: Pick<TroubleRow, 'measured' | 'bound' | 'fineSinceSec'>,
): Promise<void> {
  const isSame = measured === open.measured && bound === open.bound && fineSinceSec === open.fineSinceSec;
  if (isSame) return;
  await inTransaction((transaction) =>
    updateTrouble(open.id, { measured, bound, fineSinceSec }, transaction),
  );
}

async function endTroubleOf(trouble: TroubleRow, nowSec: number): Promise<void> {
  await inTransaction((transaction) => endTrouble(trouble.id, nowSec, transaction));
}
