import type { Complaint } from '#lib/contracts/complaints';
import { findComplaint, type ComplaintRow } from '#db/queries/complaints';
import { findNetworkById, settingsAt, type NetworkRow, type NetworkSettings } from '#db/queries/networks';
import { callApi } from '../support/callApi';
import { makeNetwork, makePerson, makeStation } from '../support/people';

/** A desk with people of every role and one station. */
export interface Desk {
  network: NetworkRow;
  settings: NetworkSettings;
  stationId: number;
  liaison: { userId: string; session: string };
  colleague: { userId: string; session: string };
  operator: string;
  regulator: string;
  administrator: string;
  /** Holds every role in another network. */
  stranger: string;
}

export async function makeDesk(): Promise<Desk> {
  const networkId = await makeNetwork('merrow');
  const elsewhere = await makeNetwork('farther');
  const stationId = await makeStation(networkId, 'MER-04', { latitude: 54.105, longitude: 1.606 });
  const network = await findNetworkById(networkId);
  if (!network) throw new Error('The network is not there.');
  return {
    network,
    settings: await settingsAt(networkId, 0),
    stationId,
    liaison: await makePerson(networkId, ['liaison']),
    colleague: await makePerson(networkId, ['liaison']),
    operator: (await makePerson(networkId, ['operator'])).session,
    regulator: (await makePerson(networkId, ['regulator'])).session,
    administrator: (await makePerson(null, [], true)).session,
    stranger: (await makePerson(elsewhere, ['operator', 'liaison', 'regulator'])).session,
  };
}

/** Logs a complaint through the interface and answers its row. */
export async function logAt(
  { network, liaison }: Desk,
  change: Record<string, unknown> = {},
): Promise<ComplaintRow> {
  const body = {
    from: '2026-03-17T03:10:00Z',
    to: '2026-03-17T03:40:00Z',
    kind: 'hum',
    station: 'MER-04',
    contact: { name: 'Ada Wren', email: 'ada@wren.example' },
    ...change,
  };
  const path = `/api/v1/networks/${network.slug}/complaints`;
  const answer = await callApi('POST', path, { session: liaison.session, body });
  if (answer.status !== 201) throw new Error(await answer.text());
  const { complaint } = (await answer.json()) as { complaint: Complaint };
  return rowOf(network, complaint.reference);
}

export async function rowOf(network: NetworkRow, reference: string): Promise<ComplaintRow> {
  const row = await findComplaint(network.id, reference);
  if (!row) throw new Error(`${reference} is not there.`);
  return row;
}
