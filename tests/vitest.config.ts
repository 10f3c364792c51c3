import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('..', import.meta.url));

/** Tests of other folders that also run on a cluster: all that can by `CLUSTER=whole`. */
const onCluster =
  process.env['CLUSTER'] === 'whole'
    ? ['tests/integration/**/*.test.ts', 'tests/faults/{clock,smtp,poison,poisonedNetwork,sharing}.test.ts']
    : ['tests/integration/ingest/order.test.ts', 'tests/integration/levels/rebuild.test.ts'];

/** Tests of what a server of their own does, with its options, accounts or files: a cluster has no part in it. */
const OF_ONE_SERVER = [
  'tests/integration/backup/pointInTime.test.ts', // its binary log
  'tests/integration/ingest/away.test.ts', // stopped, made read-only, filled; here: tests/cluster/kills.test.ts
  'tests/integration/operation/auditGrant.test.ts', // the account that Bittern makes for itself in a database of its own
  'tests/integration/operation/missingRights.test.ts', // the same account, with less
  'tests/integration/operation/databaseTls.test.ts', // its certificate
  'tests/integration/operation/migrations.test.ts', // the schema of local tables; here: tests/cluster/alter.test.ts
];

export default defineConfig({
  root,
  test: {
    reporters: ['default'],
    setupFiles: ['tests/setup.ts'],
    projects: [
      {
        extends: true,
        // They keep nothing between files, and loading modules anew for each takes longer than the tests.
        test: {
          name: 'unit',
          include: ['tests/unit/**/*.test.ts'],
          pool: 'threads',
          isolate: false,
          testTimeout: 30_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'reference',
          include: ['tests/reference/**/*.test.ts'],
          globalSetup: ['tests/integration/support/globalSetup.ts'],
          testTimeout: 60_000,
          hookTimeout: 120_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'integration',
          include: ['tests/integration/**/*.test.ts'],
          globalSetup: ['tests/integration/support/globalSetup.ts'],
          testTimeout: 60_000,
          hookTimeout: 60_000,
          pool: 'forks',
          maxWorkers: 2,
        },
      },
      {
        extends: true,
        test: {
          name: 'faults',
          include: ['tests/faults/**/*.test.ts'],
          globalSetup: ['tests/integration/support/globalSetup.ts'],
          testTimeout: 180_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
      {
        extends: true,
        test: {
          name: 'cluster',
          include: ['tests/cluster/**/*.test.ts', ...onCluster],
          exclude: OF_ONE_SERVER,
          globalSetup: ['tests/cluster/support/globalSetup.ts'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
      {
        extends: true,
        test: {
          name: 'e2e',
          include: ['tests/e2e/**/*.test.ts'],
          globalSetup: ['tests/e2e/support/globalSetup.ts'],
          testTimeout: 120_000,
          hookTimeout: 240_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
