import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

/** Adds the checks to the tests that the runner counted, prints the closing line, and fails if anything failed. */
const [passedChecks, failedChecks, resultsDirectory] = process.argv.slice(2);

const totals = { passed: Number(passedChecks), failed: Number(failedChecks), skipped: 0 };
for (const name of readdirSync(resultsDirectory).filter((file) => file.endsWith('.json'))) {
  const report = JSON.parse(readFileSync(join(resultsDirectory, name), 'utf8'));
  totals.passed += report.numPassedTests;
  totals.failed += report.numFailedTests;
  totals.skipped += report.numPendingTests + report.numTodoTests;
}
const skipped = totals.skipped > 0 ? `, ${totals.skipped} skipped` : '';
console.log(`${totals.passed} passed, ${totals.failed} failed${skipped}`);
process.exit(totals.failed > 0 ? 1 : 0);
