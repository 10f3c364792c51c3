import { calibrationSettingsOf, operatorAddresses } from '#db/queries/calibrationSettings';
import { inTransaction } from '#db/queries/connection';
import { listNetworks, settingsAt, type NetworkRow } from '#db/queries/networks';
import { config } from '#lib/config/index';
import type { DueCheck } from '#lib/contracts/calibrations';
import { formatLocalDate } from '#lib/format/times';
import { dueChecks } from '#lib/services/calibrations/due';
import { eachAlone, networkSubject } from '../jobs/alone';
import { putNotes, type Note } from './mail';

/** Reminds of each calibration check that falls due, once: of an instrument that stands at a station. @returns messages put. */
export async function remindCalibrations(now: Date): Promise<number> {
  const remind = (network: NetworkRow) => remindNetwork(network, now);
  return eachAlone('remind-calibrations', await listNetworks(), networkSubject, remind, now);
}

async function remindNetwork(network: NetworkRow, now: Date): Promise<number> {
  const nowSec = Math.floor(now.getTime() / 1000);
  const { timeZone } = await settingsAt(network.id, nowSec);
  const due = (await dueChecks(network.id, timeZone, nowSec)).filter(
    ({ state, station }) => state !== 'fine' && station !== null,
  );
  if (due.length === 0) return 0;
  const { recipients } = await calibrationSettingsOf(network.id);
  const told = recipients.length > 0 ? recipients : await operatorAddresses(network.id);
  const subjectOf = ({ instrument }: DueCheck) => ({
    name: `instrument ${instrument}`,
    networkId: network.id,
  });
  const remind = (check: DueCheck) => {
    const key = `${check.instrument}:${check.lastCheckedAt ?? 'never'}:${check.dueOn}`;
    const cause = { networkId: network.id, kind: 'calibration-due', key };
    return inTransaction((transaction) => putNotes(noteOf(check, network), cause, told, transaction));
  };
  return eachAlone('remind-calibrations', due, subjectOf, remind, now);
}

function noteOf(
  { instrument, serialNumber, station, dueOn, lastCheckedAt, state }: DueCheck,
  network: NetworkRow,
): Note {
  const due = formatLocalDate(dueOn);
  const base = `${config().origin}/n/${network.slug}/instruments`;
  return {
    subject: `${network.name}: calibration check of ${serialNumber} ${state === 'overdue' ? 'was' : 'is'} due ${due}`,
    opening: `The calibration check of instrument ${serialNumber} at station ${station ?? ''} ${state === 'overdue' ? 'was' : 'is'} due on ${due}.`,
    facts: [['Last checked', lastCheckedAt ? lastCheckedAt.slice(0, 10) : 'never']],
    link: { label: 'Note the check', url: `${base}/${instrument}` },
    closing: `You are reminded once. Who is reminded, and when: ${base}/settings`,
  };
}
