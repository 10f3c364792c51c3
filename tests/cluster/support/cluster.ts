import type { Layout } from '#ops/cluster/layout';

/** The cluster that these tests run on. */
export function testCluster(): Layout {
  const text = process.env['BITTERN_TEST_CLUSTER'];
  if (text === undefined) throw new Error('These tests run by: bash ops/test.sh cluster');
  return JSON.parse(text) as Layout;
}
