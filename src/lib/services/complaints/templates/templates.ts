import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import {
  insertTemplateVersion,
  listTemplateVersions,
  type TemplateVersion,
} from '#db/queries/letterTemplates';
import { done, invalid, unknown, type Outcome } from '../../outcome';
import { STANDARD_LETTER } from '../letter/draftReply';
import { letterProblems } from '../letter/renderLetter';

const STANDARD_NAME = 'Standard letter';
const MOST_CHARACTERS = 12_000;

/** A template that a letter may begin with. `id` is its version's; null: the standard letter, which every network has. */
export interface OfferedTemplate {
  id: number | null;
  name: string;
  version: number;
  body: string;
}

/** A network's template with all its versions, the latest first. */
export interface TemplateHistory {
  template: number;
  versions: [TemplateVersion, ...TemplateVersion[]];
}

/** Every template of a network with its history, withdrawn ones too. */
export async function templateHistories(networkId: number): Promise<TemplateHistory[]> {
  const histories = new Map<number, TemplateHistory>();
  for (const version of await listTemplateVersions(networkId)) {
    const history = histories.get(version.template);
    if (history) history.versions.push(version);
    else histories.set(version.template, { template: version.template, versions: [version] });
  }
  return [...histories.values()];
}

/** Templates that a letter may begin with: the network's own, then the standard one. */
export async function offeredTemplates(networkId: number): Promise<OfferedTemplate[]> {
  const own = (await templateHistories(networkId)).flatMap(({ versions: [latest] }) =>
    latest.isWithdrawn ? [] : [latest],
  );
  return [
    ...own.map(({ id, name, version, body }) => ({ id, name, version, body })),
    { id: null, name: STANDARD_NAME, version: 1, body: STANDARD_LETTER },
  ];
}

/** What is kept of a template; `template` null: a new one, `version`: the one that it was changed from. */
export interface TemplateEntry {
  template: number | null;
  version: number;
  name: string;
  body: string;
}

/** Keeps a template as its next version; the letters written from earlier ones stay as they are. */
export async function keepTemplate(
  who: { networkId: number; userId: string },
  entry: TemplateEntry,
): Promise<Outcome<number>> {
  const name = entry.name.trim();
  const body = entry.body.replaceAll('\r\n', '\n').trim();
  if (name === '' || name.length > 120) return invalid('name', 'must have 1 to 120 characters');
  if (body === '') return invalid('body', 'must not be empty');
  if (body.length > MOST_CHARACTERS) return invalid('body', 'must have at most 12,000 characters');
  const [problem] = letterProblems(body);
  if (problem) return invalid('body', problem);
  return addVersion(who, { ...entry, name, body, isWithdrawn: false });
}

/** Withdraws a template, or brings a withdrawn one back, by a version of its own. */
export async function withdrawTemplate(
  who: { networkId: number; userId: string },
  template: number,
  isWithdrawn: boolean,
): Promise<Outcome<number>> {
  const found = (await templateHistories(who.networkId)).find((history) => history.template === template);
  if (!found) return unknown('The network has no such template.');
  const [latest] = found.versions;
  if (latest.isWithdrawn === isWithdrawn) return done(template);
  return addVersion(who, { ...latest, isWithdrawn });
}

async function addVersion(
  { networkId, userId }: { networkId: number; userId: string },
  entry: TemplateEntry & { isWithdrawn: boolean },
): Promise<Outcome<number>> {
  return inTransaction(async (transaction) => {
    const versions = await listTemplateVersions(networkId, transaction);
    const template = entry.template ?? Math.max(0, ...versions.map((version) => version.template)) + 1;
    const latest = versions.find((version) => version.template === template);
    if (entry.template !== null && !latest) return unknown('The network has no such template.');
    const version = (latest?.version ?? 0) + 1;
    const isOvertaken = latest !== undefined && entry.version !== latest.version;
    const { name, body, isWithdrawn } = entry;
    const row = { networkId, template, version, name, body, isWithdrawn, createdBy: userId };
    if (isOvertaken || !(await insertTemplateVersion(row, transaction))) {
      return invalid(
        'body',
        'was changed by somebody else meanwhile: nothing was kept, look at theirs first',
      );
    }
    await appendAudit(
      {
        userId,
        networkId,
        action: isWithdrawn ? 'letter-template.withdraw' : 'letter-template.keep',
        subject: `letter template ${template}`,
        detail: { name, version },
      },
      transaction,
    );
    return done(template);
  });
}
