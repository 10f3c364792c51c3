import { db } from '#db/client';
import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { openValue } from '#lib/services/complaints/personalData';
import { keepFile } from '#lib/services/files/keptFile';
import { at, storeMinutes } from '../complaints/support';
import { givePassword } from '../people/support';
import { callApi } from '../support/callApi';
import { askServer } from './support';
import { makeNetwork, makePerson, makeStation } from '../support/people';

/** What residents tell, to be found again after a restore. */
export const WORDS = 'Woken at 03:40 by a hum, “again”\nsecond line \\ \' " 🌙';

/** Texts that a dump has to keep as they are. */
const AWKWARD = [
  'a\nb\r\n\t\\n',
  "it's; (1,'x');",
  'INSERT INTO `users` VALUES (1);',
  '„Lärm“ 🌙',
  'DELIMITER ;;',
];

/** Fills the database and the data directory with something of every kind that a backup has to treat in its own way. */
export async function fillInstance(password: string) {
  const networkId = await makeNetwork('merrow');
  const stationId = await makeStation(networkId, 'MER-01');
  await storeMinutes(stationId, at('2026-03-01T00:00:00Z'), at('2026-03-02T00:00:00Z'), (startSec) => ({
    laeqCentiDb: 5000 + (startSec % 997),
    bandCentiDb: (band) => 4000 + 7 * band,
  }));
  const { userId, session } = await makePerson(networkId, ['liaison']);
  const email = await givePassword(userId, password);
  const photo = await keepFile('photos', Buffer.from('a photo'));
  await db()('station_photos').insert({
    station_id: stationId,
    taken_on: '2026-03-01',
    caption: 'The mast',
    media_type: 'image/jpeg',
    byte_count: 7,
    sha256: photo,
    uploaded_by: userId,
    uploaded_at: new Date(),
  });
  // A computed column, and a blob with every byte.
  await db()('station_day_traces').insert([
    { station_id: stationId, starts_at: 1_772_323_200 },
    {
      station_id: stationId,
      starts_at: 1_772_409_600,
      shapes: Buffer.from(Array.from({ length: 256 }, (_, byte) => byte)),
    },
  ]);
  for (const [place, text] of AWKWARD.entries()) await note(networkId, `text ${place}`, { text });
  return { networkId, email, photo, session };
}

/** Logs a complaint with something personal and answers its reference. */
export async function complain(session: string, words: string): Promise<string> {
  const answer = await callApi('POST', '/api/v1/networks/merrow/complaints', {
    session,
    body: {
      from: '2026-03-01T03:40:00Z',
      to: '2026-03-01T03:55:00Z',
      kind: 'hum',
      latitude: 54.10312,
      longitude: 1.60277,
      words,
      contact: { name: 'Ada Wren', email: 'ada@wren.example', phone: '0555 0142', address: '3 Tern Row' },
    },
  });
  if (answer.status !== 201) throw new Error(await answer.text());
  const { complaint } = (await answer.json()) as { complaint: { reference: string } };
  return complaint.reference;
}

/** What residents told, of those complaints whose key a database has. */
export async function wordsIn(database: string): Promise<string[]> {
  const rows = await askServer(
    `SELECT complaint_id AS id, wrapped_key, ciphertext FROM complaint_private JOIN complaint_keys USING (complaint_id) ORDER BY id`,
    database,
  );
  return rows.map(({ id, wrapped_key: key, ciphertext }) => {
    const person = openValue(key, id, 'person', ciphertext) as { words: string };
    return person.words;
  });
}

/** Appends to the audit trail one act after the other, until told to stop; answers how many there were. */
export function startWriting(networkId: number): { stop(): Promise<number> } {
  let isWriting = true;
  const writer = (async () => {
    let count = 0;
    for (; isWriting; count += 1) await note(networkId, `while ${count}`, {});
    return count;
  })();
  return {
    stop() {
      isWriting = false;
      return writer;
    },
  };
}

function note(networkId: number, subject: string, detail: Record<string, unknown>): Promise<void> {
  const entry = { userId: null, networkId, action: 'drill.note', subject, detail };
  return inTransaction((transaction) => appendAudit(entry, transaction));
}
