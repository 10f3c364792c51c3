import { gzipSync } from 'node:zlib';
import { expect } from 'vitest';
import { inTransaction } from '#db/queries/connection';
import { findStation, type StationRow } from '#db/queries/stations';
import { insertStationToken } from '#db/queries/stationTokens';
import { bandRange } from '#lib/acoustics/bands';
import { callApi } from '../../integration/support/callApi';
import { makeNetwork, makePerson, makeStation } from '../../integration/support/people';
import { present } from './fixtures';

/** Intervals of one post; 6000 minutes of thirds are about 1.5 MB of JSON. */
const BATCH = 6000;

/** A network in Europe/London with a regulator signed in, and ways to post to it and to read from it as outsiders do. */
export class PostedNetwork {
  readonly #id: number;
  readonly #session: string;

  private constructor(id: number, session: string) {
    this.#id = id;
    this.#session = session;
  }

  static async make(): Promise<PostedNetwork> {
    const id = await makeNetwork('posted', {
      timeZone: 'Europe/London',
      rules: { maximumWindSpeedMs: 5, excludeRain: false },
    });
    return new PostedNetwork(id, (await makePerson(id, ['regulator'])).session);
  }

  /** Registers a third-octave station and posts its records, packed, as a monitor does. */
  async post(
    code: string,
    lowestHz: number,
    highestHz: number,
    records: readonly object[],
  ): Promise<StationRow> {
    const bands = bandRange(3, lowestHz, highestHz);
    const id = await makeStation(this.#id, code, {
      firstBandIndex: present(bands[0]).index,
      lastBandIndex: present(bands.at(-1)).index,
    });
    const token = await inTransaction((transaction) => insertStationToken(id, null, transaction));
    for (let at = 0; at < records.length; at += BATCH) {
      const intervals = records.slice(at, at + BATCH);
      const response = await callApi('POST', '/api/v1/intervals', {
        token,
        body: gzipSync(JSON.stringify({ bands: bands.map(({ nominalHz }) => nominalHz), intervals }), {
          level: 1,
        }),
        headers: { 'content-type': 'application/json', 'content-encoding': 'gzip' },
      });
      expect(await response.json()).toMatchObject({ accepted: intervals.length, known: 0, refused: [] });
    }
    return present(await findStation(this.#id, code));
  }

  /** Reads a station's resource, such as `statistics`. */
  async get<T>(code: string, resource: string, query: Record<string, string>): Promise<T> {
    const search = new URLSearchParams(query).toString();
    const path = `/api/v1/networks/posted/stations/${code}/${resource}?${search}`;
    const response = await callApi('GET', path, { session: this.#session });
    expect(response.status, await response.clone().text()).toBe(200);
    return (await response.json()) as T;
  }
}
