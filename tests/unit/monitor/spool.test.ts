import { appendFileSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { Spool } from '#ingest/monitor/spool';

let directory: string;

beforeEach(() => {
  directory = mkdtempSync(join(tmpdir(), 'bittern-spool-'));
});
afterEach(() => rmSync(directory, { recursive: true }));

const record = (startSec: number) => ({ startSec, record: { LAeq: startSec } });

test('what waits survives a restart, in order, until it is settled', () => {
  const spool = new Spool(directory);
  spool.append([record(60), record(120)]);
  spool.append([record(180)]);
  spool.settle(1);
  const again = new Spool(directory);
  expect(again.oldest(10)).toEqual([record(120), record(180)]);
  expect(again.lastStartSec).toBe(180);
});

test('a line cut short by a loss of power costs that line only', () => {
  new Spool(directory).append([record(60)]);
  appendFileSync(join(directory, 'waiting.ndjson'), '{"startSec":120,"rec');
  expect(new Spool(directory).oldest(10)).toEqual([record(60)]);
});

test('records are on disk before append returns', () => {
  new Spool(directory).append([record(60)]);
  expect(readFileSync(join(directory, 'waiting.ndjson'), 'utf8')).toContain('"startSec":60');
});
