import { inTransaction } from '#db/queries/connection';
import { operatorAddresses } from '#db/queries/calibrationSettings';
import { endTrouble, insertTrouble, updateTrouble, type TroubleRow } from '#db/queries/health';
import type { HealthSettingsRow } from '#db/queries/healthSettings';
import { settingsAt, type NetworkRow } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { type TroubleKind } from '#lib/contracts/health';
import { type Finding } from '#lib/services/health/evidence';
import { putNotes } from './mail';
import { beginNote, overNote } from './troubleNote';

/** A trouble is over when it has seemed so for this long: what comes and goes is told once. */
const SETTLED_AFTER_SEC = 600;

/** What following a network's troubles needs. */
export interface Watch {
  network: NetworkRow;
  zone: string;
  recipients: string[];
  nowSec: number;
}

/** Who is told of a network's troubles, and in which zone. */
export async function watchOf(
  network: NetworkRow,
  settings: readonly HealthSettingsRow[],
  nowSec: number,
): Promise<Watch> {
  const { timeZone } = await settingsAt(network.id, nowSec);
  const named = settings.find(({ stationId }) => stationId === 0)?.recipients ?? [];
  const recipients = named.length > 0 ? named : await operatorAddresses(network.id);
  return { network, zone: timeZone, recipients, nowSec };
}

/** Keeps what a rule found of a station: one message when it begins, one when it is over. @returns whether it began or was over. */
export async function follow(
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

/** Ends a trouble without a message: its station is in use no longer. */
export async function endTroubleOf(trouble: TroubleRow, nowSec: number): Promise<void> {
  await inTransaction((transaction) => endTrouble(trouble.id, nowSec, transaction));
}
