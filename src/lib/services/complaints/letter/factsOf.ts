import type { ComplaintRow } from '#db/queries/complaints';
import type { NetworkRow } from '#db/queries/networks';
import type { PersonalData } from '#lib/contracts/complaints';
import type { EvidencePack } from '#lib/contracts/evidencePack';
import { windNamed } from '../whereabouts';
import type { LetterFacts } from './facts';

/** What a letter is written from: a pack as it was gathered or kept, and who writes to whom. */
export function factsOf({
  network,
  complaint,
  person,
  signedBy,
  pack,
}: {
  network: Pick<NetworkRow, 'name'>;
  complaint: Pick<ComplaintRow, 'reference' | 'kind'>;
  person: PersonalData;
  signedBy: string;
  pack: EvidencePack;
}): LetterFacts {
  const whereabouts = pack.standings.flatMap(({ station, distanceM, wind, bearingDeg }) => {
    const known = windNamed(wind);
    return distanceM === null || bearingDeg === null || known === null
      ? []
      : [[station, { distanceM, wind: known, bearingDeg }] as const];
  });
  return {
    reference: complaint.reference,
    networkName: network.name,
    kind: complaint.kind,
    recipientName: person.contact.name,
    signedBy,
    evidence: pack.evidence,
    whereabouts: Object.fromEntries(whereabouts),
    reports: pack.reports,
  };
}
