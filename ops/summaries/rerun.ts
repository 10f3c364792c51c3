import { closeDb } from '#db/client';
import { listIssued } from '#db/queries/issuedSummaries';
import { findNetworkBySlug } from '#db/queries/networks';
import { SealBroken } from '#lib/services/summaries/life/differences';
import { rerunMonth } from '#lib/services/summaries/life/rerun';
import { rerunWords } from './rerunWords';

/**
 * Computes an issued month again from its intervals and compares it with what was sealed. Nothing is changed.
 * Usage: npx tsx ops/summaries/rerun.ts NETWORK YYYY-MM [REVISION]. Ends with 0 where all is the same, 1 where something differs, 2 where
 * it could not be asked.
 */
const [slug = '', month = '', revisionText] = process.argv.slice(2);

async function run(): Promise<number> {
  const network = await findNetworkBySlug(slug);
  const revisions = network ? await listIssued(network.id, month) : [];
  const issued =
    revisionText === undefined
      ? revisions[0]
      : revisions.find(({ revision }) => revision === Number(revisionText));
  if (!network || !issued) {
    process.stderr.write('Usage: npx tsx ops/summaries/rerun.ts NETWORK YYYY-MM [REVISION]\n');
    process.stderr.write(`Nothing of ${month || 'that month'} was issued in that network.\n`);
    return 2;
  }
  try {
    const { isSame, lines } = rerunWords(issued, await rerunMonth(network, issued));
    process.stdout.write(`${lines.join('\n')}\n`);
    return isSame ? 0 : 1;
  } catch (error) {
    if (!(error instanceof SealBroken)) throw error;
    process.stdout.write(`${error.message}\n`);
    return 1;
  }
}

process.exitCode = await run().finally(closeDb);
