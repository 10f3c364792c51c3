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

test('proxies are a number, or addresses and blocks', () => {
  const trusted = (text: string) =>
    parseConfig({ ...REQUIRED, BITTERN_TRUSTED_PROXIES: text }).trustedProxies;
  expect(trusted('2')).toBe(2);
  expect(trusted('10.0.0.5, 10.1.0.0/16,2001:db8::/32')).toEqual([
    '10.0.0.5',
    '10.1.0.0/16',
    '2001:db8::/32',
  ]);
  for (const wrong of ['9', '-1', 'all', '10.0.0.0/33', '10.0.0.0/8/8', 'proxy.example']) {
    expect(() => trusted(wrong), wrong).toThrow('BITTERN_TRUSTED_PROXIES');
  }
});

test('map data may come from where styles are, and from what is named besides', () => {
  const settings = {
    BITTERN_STYLE_LIGHT_URL: 'https://maps.merrow.example/light.json?key=1',
    BITTERN_STYLE_DARK_URL: 'https://maps.merrow.example/dark.json',
    BITTERN_MAP_ORIGINS: 'https://tiles.merrow.example',
  };
  expect(parseConfig({ ...REQUIRED, ...settings }).mapOrigins).toEqual([
    'https://maps.merrow.example',
    'https://tiles.merrow.example',
  ]);
  expect(() =>
    parseConfig({ ...REQUIRED, BITTERN_MAP_ORIGINS: "https://a.example/ 'unsafe-inline'" }),
  ).toThrow('BITTERN_MAP_ORIGINS');
});
