import { config } from '#lib/config/index';
import { closeDb } from '#db/client';
import { auditDigestAt, findAuditBreak } from '#db/queries/audit';
import { auditHead } from '#db/queries/auditLog';

const HOLDS = 0;
const BROKEN = 1;
const UNKNOWN = 2;

const USAGE = `Reads the whole audit trail: npx tsx ops/verifyAudit.ts [--head POSITION:SHA256]…
  --head  also compares a head that was mailed earlier
Exit codes: ${HOLDS} it holds; ${BROKEN} it was changed; ${UNKNOWN} it could not be looked at.`;

process.exitCode = await verify(process.argv.slice(2)).catch((error: unknown) => {
  console.error(
    `The trail could not be looked at: ${error instanceof Error ? error.message : String(error)}`,
  );
  return UNKNOWN;
});
await closeDb();

async function verify(given: string[]): Promise<number> {
  const heads = headsOf(given);
  if (heads === null) {
    console.error(USAGE);
    return UNKNOWN;
  }
  const brokenAt = await findAuditBreak();
  if (brokenAt !== null) {
    console.error(`The trail of ${config().database.name} was changed: act ${brokenAt} does not fit.`);
    return BROKEN;
  }
  for (const { position, sha256 } of heads) {
    const found = await auditDigestAt(position);
    if (found === sha256) continue;
    const reason = found === null ? 'there is no such act any more' : 'it has another digest';
    console.error(`The trail is not the one whose head was ${position}:${sha256}: ${reason}.`);
    return BROKEN;
  }
  const { position, sha256 } = await auditHead();
  console.log(`The trail holds: ${position} acts, head ${position}:${sha256}.`);
  return HOLDS;
}

/** Heads to compare with; null where an argument is wrong. */
function headsOf(given: string[]): { position: number; sha256: string }[] | null {
  const heads: { position: number; sha256: string }[] = [];
  for (let at = 0; at < given.length; at += 2) {
    const [, position, sha256] = /^(\d{1,15}):([0-9a-f]{64})$/.exec(given[at + 1] ?? '') ?? [];
    if (given[at] !== '--head' || position === undefined || sha256 === undefined) return null;
    heads.push({ position: Number(position), sha256 });
  }
  return heads;
}
