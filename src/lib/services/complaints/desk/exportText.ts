import type { HeldComplaint, PersonalExport } from '#lib/contracts/personalExport';

/** What is held about a person, to be read: the same as the JSON, files by their kind and size. */
export function exportText({ network, keeper, madeAt, keptUntil, complaints }: PersonalExport): string {
  const head = [
    `What ${network} holds about you`,
    `Made on ${madeAt.slice(0, 10)}. Kept by ${keeper}.`,
    `It is kept for ${keptUntil}.`,
    complaints.length === 1 ? 'One report.' : `${complaints.length} reports.`,
  ];
  return [head.join('\n'), ...complaints.map(complaintText)].join('\n\n') + '\n';
}

function complaintText(held: HeldComplaint): string {
  const { person } = held;
  const { name, email, phone, address } = person.contact;
  const place = person.place && `${person.place.latitude}, ${person.place.longitude}`;
  const lines: [label: string, value: string | null][] = [
    ['Time of the noise', `${held.from} to ${held.to}`],
    ['Sound', held.kind],
    ['Area', held.area],
    ['Nearest station', held.nearestStation],
    ['Reported', `${held.loggedAt}, ${held.source === 'resident' ? 'on the public form' : 'at the desk'}`],
    ['Status', held.status],
    ['Name', name],
    ['E-mail', email],
    ['Phone', phone],
    ['Address', address],
    ['Place', place],
    ['What it did', (person.effects ?? []).join(', ') || null],
    ['Your words', person.words || null],
    ['File', held.file && `${held.file.mediaType}, ${Buffer.byteLength(held.file.base64, 'base64')} bytes`],
  ];
  const filled = lines.filter(([, value]) => value !== null).map(([label, value]) => `${label}: ${value}`);
  const dated: [label: string, entries: readonly { at: string; text: string }[]][] = [
    ['You added', held.additions],
    ['We wrote', held.replies],
    ['You wrote', held.received],
    ['Our note', held.notes],
  ];
  const texts = dated.flatMap(([label, entries]) =>
    entries.map(({ at, text }) => `${label} (${at}):\n${text}`),
  );
  const inHand = held.answerInHand === null ? [] : [`An answer that is being written:\n${held.answerInHand}`];
  const title = `Report ${held.reference}`;
  return [`${title}\n${'-'.repeat(title.length)}`, filled.join('\n'), ...texts, ...inHand].join('\n\n');
}
