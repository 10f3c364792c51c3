import { readAnsweringSettings, type AnsweringSettings } from '#db/queries/answeringSettings';
import { findOpenAnswer, type AnswerRow } from '#db/queries/complaintAnswers';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { countReplies } from '#db/queries/complaintReplies';
import { findComplaint, type ComplaintRow } from '#db/queries/complaints';
import type { NetworkRow } from '#db/queries/networks';
import { findUserById } from '#db/queries/users';
import type { PersonalData } from '#lib/contracts/complaints';
import type { EvidencePack, PackItem } from '#lib/contracts/evidencePack';
import { factsOf } from '../letter/factsOf';
import { LETTER_FIELDS } from '../letter/fields';
import { gatherPack } from '../pack/gatherPack';
import { readPersonalData } from '../readPersonalData';
import { offeredTemplates, type OfferedTemplate } from '../templates/templates';
import { USUAL_ITEMS } from './items';
import { openAnswer } from './keptAnswer';
import { letterText, type LetterText } from './makeLetter';

/** A field with what it says in this letter. */
export interface FilledField {
  name: string;
  label: string;
  kind: 'statement' | 'figure' | 'fact';
  value: string;
}

/** Where a kept answer stands. */
export type KeptAnswerShown = Pick<
  AnswerRow,
  'id' | 'state' | 'revision' | 'author' | 'authorName' | 'submittedAt'
>;

/** All that is needed to write the answer to a complaint. */
export interface AnswerDesk {
  complaint: ComplaintRow;
  person: PersonalData;
  pack: EvidencePack;
  /** The answer as it was kept; null: nothing has been kept yet. */
  kept: KeptAnswerShown | null;
  /** Text with fields: as kept, else the network's first template. */
  body: string;
  items: readonly PackItem[];
  templateVersionId: number | null;
  letter: LetterText;
  signedBy: string;
  fields: FilledField[];
  templates: OfferedTemplate[];
  settings: AnsweringSettings;
  repliesSoFar: number;
  /** Whether the figures are other ones than those that were submitted. */
  isOutdated: boolean;
}

/**
 * Opens the desk on which a complaint is answered, for a person who may read personal data; that look is audited. `chosen`: a template
 * to begin with in place of what was kept. Undefined where the network has no such complaint; null once erased.
 */
export async function openAnswerDesk(
  userId: string,
  network: NetworkRow,
  reference: string,
  now: Date,
  chosen: number | null = null,
): Promise<AnswerDesk | null | undefined> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return undefined;
  const file = await readPersonalData(userId, complaint);
  const sealed = await findSealedPerson(complaint.id);
  if (!file || !sealed) return null;
  const { person } = file;
  const nowSec = Math.floor(now.getTime() / 1000);
  const [gathered, kept, templates, settings, repliesSoFar] = await Promise.all([
    gatherPack({ network, complaint, place: person.place, nowSec }),
    findOpenAnswer(complaint.id),
    offeredTemplates(network.id),
    readAnsweringSettings(network.id),
    countReplies(complaint.id),
  ]);
  const template = templates.find(({ id }) => id === chosen) ?? templates[0];
  const isFresh = !kept || (chosen !== null && kept.state === 'draft');
  const content = kept ? openAnswer(sealed.wrappedKey, kept) : null;
  const body = isFresh ? (template?.body ?? '') : (content?.body ?? '');
  const pack = { ...gathered, elsewhere: content?.elsewhere ?? null };
  const items = kept?.items ?? USUAL_ITEMS;
  const author = await findUserById(kept?.author ?? userId);
  const signedBy = author?.name ?? '';
  const source = { network, complaint, person, body, items, pack, signedBy };
  const facts = factsOf(source);
  return {
    complaint,
    person,
    pack,
    kept: kept ? shownOf(kept) : null,
    body,
    items,
    templateVersionId: isFresh ? (template?.id ?? null) : kept.templateVersionId,
    letter: letterText(source),
    signedBy,
    fields: LETTER_FIELDS.map(({ render, ...field }) => ({ ...field, value: render(facts) })),
    templates,
    settings,
    repliesSoFar,
    isOutdated: kept?.state === 'submitted' && kept.figuresDigest !== pack.evidence.digest,
  };
}

function shownOf(kept: AnswerRow): KeptAnswerShown {
  const { id, state, revision, author, authorName, submittedAt } = kept;
  return { id, state, revision, author, authorName, submittedAt };
}
