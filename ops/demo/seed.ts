import type { Config } from '#lib/config/config';
import { findNetworkById, settingsAt } from '#db/queries/networks';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { pendWindowsFor } from '#ingest/detect/pendWindows';
import { judgeLimits } from '#ingest/jobs/judgeLimits';
import { DEFAULT_DEMO_PASSWORD } from './accounts';
import { seedAcknowledgements } from './acknowledgements';
import { seedComplaints } from './complaints';
import { seedExclusions, seedLimits } from './decisions';
import { seedHistory } from './history';
import { seedInstruments } from './instruments';
import { seedMast } from './mast';
import { seedPeople } from './people';
import { seedPhotos } from './photos';
import { seedReportForm } from './reportForm';
import { seedQuarantine } from './quarantine';
import { seedSelfChecks } from './selfChecks';
import { seedStations } from './stations';
import { seedSummaries } from './summaries';

const DAY_SEC = 86_400;
const STATIONS_AT_ONCE = 4;

/** Makes the demo by the ways that real data take: registration, receiving, exclusions, aggregation, judging, complaints. */
export async function seedDemo(settings: Config, tell: (line: string) => void): Promise<void> {
  const { days, password } = settings.demo;
  const nowSec = Math.floor(Date.now() / 1000);
  const { networkId, people } = await seedPeople(password ?? DEFAULT_DEMO_PASSWORD);
  const operatorId = idOf(people, 'operator@merrow.example');
  const stations = await seedStations(networkId, operatorId, settings.dataDir, days);
  const span = { fromSec: nowSec - days * DAY_SEC, nowSec };
  tell(`${await seedMast(networkId, operatorId, settings.dataDir, span)} records of the weather mast`);
  await seedLimits(networkId, operatorId, stations, nowSec - days * DAY_SEC);

  let intervals = 0;
  const waiting = [...stations];
  const seedWaiting = async () => {
    for (let next = waiting.shift(); next; next = waiting.shift()) {
      const count = await seedHistory(next, days, nowSec);
      intervals += count;
      tell(`${next.site.code} ${next.site.name}: ${count.toLocaleString('en-GB')} intervals`);
    }
  };
  // Several at once: while one's post is being made durable, another's is being computed.
  await Promise.all(Array.from({ length: STATIONS_AT_ONCE }, seedWaiting));
  tell(`${await seedQuarantine(stations, nowSec, days)} records refused and kept`);
  const instruments = await seedInstruments({
    networkId,
    userId: operatorId,
    nowSec,
    historyDays: days,
    stations,
  });
  tell(`${instruments} instruments`);
  tell(`${await seedPhotos(operatorId, stations, days)} pictures of stations`);
  tell(`${await seedSelfChecks(stations, nowSec, days)} self-checks`);
  await seedExclusions(networkId, operatorId, stations, nowSec, days);
  const quarters = await aggregateAll(pendWindowsFor);
  tell(
    `${quarters.toLocaleString('en-GB')} quarter-hours computed from ${intervals.toLocaleString('en-GB')} intervals`,
  );
  tell(`${await judgeAll()} windows of limits judged`);
  tell(`${await seedAcknowledgements(networkId, operatorId, nowSec)} exceedances acknowledged`);

  const network = await findNetworkById(networkId);
  if (!network) throw new Error('The network just made is not there.');
  const desk = {
    network,
    settings: await settingsAt(networkId, nowSec),
    liaisonId: idOf(people, 'liaison@merrow.example'),
    stations,
  };
  // Complaints name areas of the form.
  await seedReportForm(network, desk.liaisonId, stations);
  tell(`${await seedComplaints(desk, nowSec, days)} complaints`);
  const months = await seedSummaries(network, operatorId);
  tell(`${months} ${months === 1 ? 'month' : 'months'} issued`);
}

async function judgeAll(): Promise<number> {
  for (let judged = 0; ;) {
    const round = await judgeLimits(new Date());
    if (round === 0) return judged;
    judged += round;
  }
}

function idOf(people: Map<string, string>, email: string): string {
  const id = people.get(email);
  if (!id) throw new Error(`${email} is not among the demo's people.`);
  return id;
}
