import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { DOUBT_DECISIONS } from '#lib/contracts/calibrations';
import { actInWords, AUDIT_ACTS } from '#lib/format/auditActs';

/** Nouns of acts; a table's or file's name that looks like one is none. */
const NOUNS = new Set(Object.keys(AUDIT_ACTS).map((action) => action.split('.')[0] ?? ''));
/** What is named with a dot and is no act, though its noun is one. */
const NO_ACTS = /\.(?:csv|json|pdf|xlsx|zip)$|^quarantine\.(?:code|detail|id|record|settlement)$/;
/** Acts whose verb comes from a value, with what it can be. */
const COMPOSED: Record<string, readonly string[]> = {
  'doubt.${decision}': DOUBT_DECISIONS,
  'summary.${act.act}': ['discard', 'draft', 'issue', 'return', 'submit'],
  'weather-quarantine.${act}': ['dismiss', 'release', 'reopen'],
};
/** Events of webhooks, which are no acts. */
const NOT_COMPOSED = new Set(['exceedance.${kind}']);

function sources(): string[] {
  return ['src', 'db/queries', 'ingest', 'ops/start', 'ops/demo', 'ops/keys'].flatMap((folder) =>
    readdirSync(folder, { recursive: true, encoding: 'utf8' })
      .filter((name) => name.endsWith('.ts') && !name.endsWith('auditActs.ts'))
      .map((name) => readFileSync(`${folder}/${name}`, 'utf8')),
  );
}

/** The names of acts that stand in the sources; in a file that writes to the trail every name of that form, else those of nouns that are known. */
function actsWritten(): Set<string> {
  const acts = new Set<string>();
  for (const source of sources()) {
    const doesWrite = /\bappendAudit\(/.test(source);
    for (const [, action = ''] of source.matchAll(/'([a-z]+(?:-[a-z]+)*\.[a-z]+(?:-[a-z]+)*)'/g)) {
      if ((doesWrite || NOUNS.has(action.split('.')[0] ?? '')) && !NO_ACTS.test(action)) acts.add(action);
    }
    for (const [, composed = ''] of source.matchAll(/`([a-z]+(?:-[a-z]+)*\.\$\{[\w.]+\})`/g)) {
      if (!doesWrite && !NOUNS.has(composed.split('.')[0] ?? '')) continue;
      if (NOT_COMPOSED.has(composed)) continue;
      const verbs = COMPOSED[composed];
      if (!verbs) acts.add(composed);
      for (const verb of verbs ?? []) acts.add(`${composed.split('.')[0]}.${verb}`);
    }
  }
  return acts;
}

test('every act that is written has words, and no words are left of acts that are not', () => {
  expect([...actsWritten()].sort()).toEqual(Object.keys(AUDIT_ACTS).sort());
});

test('no two acts are told alike, and one that has no words keeps its name', () => {
  const words = Object.values(AUDIT_ACTS);
  expect(new Set(words).size).toBe(words.length);
  expect(actInWords('later.thing')).toBe('later.thing');
});
