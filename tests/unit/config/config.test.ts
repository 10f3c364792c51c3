import { expect, test } from 'vitest';
import { parseConfig, type SettingsError } from '#lib/config/config';

const REQUIRED = { BITTERN_DB_PASSWORD: 'secret', BITTERN_PERSONAL_DATA_KEY: 'ab'.repeat(32) };

test('defaults listen on loopback and point at the stand-ins', () => {
  const config = parseConfig(REQUIRED);
  expect(config.origin).toBe('http://127.0.0.1:4321');
  expect(config.mapStyleUrls.light).toBe('http://127.0.0.1:4331/style/light.json');
  expect(config.allowedHosts).toContain('localhost:4321');
});

test('every bad setting is told at once, with its name', () => {
  const environment = { BITTERN_PORT: '0', BITTERN_SMTP_SECURE: 'maybe', BITTERN_DEMO_DAYS: 'many' };
  let problems: string[] = [];
  try {
    parseConfig(environment);
  } catch (error) {
    problems = (error as SettingsError).problems;
  }
  expect(problems.map((problem) => problem.split(':')[0])).toEqual([
    'BITTERN_DB_PASSWORD',
    'BITTERN_DEMO_DAYS',
    'BITTERN_PERSONAL_DATA_KEY',
    'BITTERN_PORT',
    'BITTERN_SMTP_SECURE',
  ]);
});

test('an empty setting counts as left out', () => {
  expect(parseConfig({ ...REQUIRED, BITTERN_PORT: '' }).port).toBe(4321);
});

test('the public address decides origin and hosts', () => {
  const config = parseConfig({ ...REQUIRED, BITTERN_ORIGIN: 'https://noise.merrow.example/' });
  expect(config.origin).toBe('https://noise.merrow.example');
  expect(config.allowedHosts).toContain('noise.merrow.example');
});
