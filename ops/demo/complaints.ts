import { db } from '#db/client';
import type { NetworkRow, NetworkSettings } from '#db/queries/networks';
import { answerCase } from '#lib/services/complaints/answerCase';
import { STANDARD_LETTER } from '#lib/services/complaints/letter/draftReply';
import { logComplaint } from '#lib/services/complaints/logComplaint';
import { addDays, instantAtSec, localDateAt } from '#lib/time/zone';
import { DEMO_COMPLAINTS, type DemoComplaint } from './complaintTexts';
import { areaAround } from './reportForm';
import type { DemoStation } from './stations';

const DAY_MS = 86_400_000;

interface Desk {
  network: NetworkRow;
  settings: NetworkSettings;
  liaisonId: string;
  stations: DemoStation[];
}

/** Logs the demo's complaints a few hours after their noise and answers the older ones three days later, oldest first. */
export async function seedComplaints(desk: Desk, nowSec: number, historyDays: number): Promise<number> {
  const complaints = DEMO_COMPLAINTS.filter(({ daysAgo }) => daysAgo < historyDays - 1);
  for (const complaint of complaints.toReversed()) await seedComplaint(desk, complaint, nowSec);
  return complaints.length;
}

async function seedComplaint(desk: Desk, complaint: DemoComplaint, nowSec: number): Promise<void> {
  const { network, settings, liaisonId } = desk;
  const { timeZone } = settings;
  const date = addDays(localDateAt(nowSec, timeZone), -complaint.daysAgo);
  const fromSec = instantAtSec(date, Math.round(complaint.hour * 60), timeZone);
  const toSec = fromSec + complaint.minutes * 60;
  const loggedAt = new Date(Math.min(nowSec, toSec + 5 * 3600) * 1000);
  const outcome = await logComplaint(
    { userId: liaisonId, network, settings },
    {
      from: fromSec,
      to: toSec,
      kind: complaint.kind,
      ...homeNear(desk.stations, complaint),
      station: null,
      area: areaAround(stationOf(desk.stations, complaint.station).site),
      words: complaint.words,
      contact: {
        name: complaint.name,
        email: `${complaint.name.toLowerCase().replace(' ', '.')}@residents.example`,
        phone: null,
        address: null,
      },
    },
    loggedAt,
  );
  if (outcome.kind !== 'logged') throw new Error(outcome.message);
  const row = db()('complaints').where({ reference: outcome.reference });
  await row.clone().update({ created_at: loggedAt });
  if (!complaint.isAnswered) return;
  const answeredAt = new Date(loggedAt.getTime() + 3 * DAY_MS);
  await answer(desk, outcome.reference, answeredAt);
  await row.clone().update({ answered_at: answeredAt });
}

function stationOf(stations: DemoStation[], code: string): DemoStation {
  const found = stations.find(({ site }) => site.code === code);
  if (!found) throw new Error(`There is no station ${code}.`);
  return found;
}

/** A home a few hundred metres from the station that stands for it. */
function homeNear(stations: DemoStation[], { station: code, daysAgo }: DemoComplaint) {
  const { site } = stationOf(stations, code);
  const turn = daysAgo * 2.4;
  return {
    latitude: site.latitude + 0.0016 * Math.sin(turn),
    longitude: site.longitude + 0.0028 * Math.cos(turn),
  };
}

async function answer(desk: Desk, reference: string, at: Date): Promise<void> {
  const letter = { text: STANDARD_LETTER, items: null, figuresDigest: null, repliesSoFar: null };
  const outcome = await answerCase(desk.liaisonId, desk.network, reference, letter, at);
  if (outcome.kind !== 'sent') throw new Error(`${reference} was not answered: ${outcome.kind}.`);
}
