import { makePerson } from '../support/people';

export type Who = 'nobody' | 'stranger' | 'regulator' | 'liaison' | 'operator' | 'administrator';
export type Sessions = Record<Who, string>;

/** A session of every kind of caller; the stranger holds every role, in another network. */
export async function roleSessions(networkId: number, elsewhere: number): Promise<Sessions> {
  const of = async (...given: Parameters<typeof makePerson>) => (await makePerson(...given)).session;
  return {
    nobody: '',
    stranger: await of(elsewhere, ['operator', 'liaison', 'regulator']),
    regulator: await of(networkId, ['regulator']),
    liaison: await of(networkId, ['liaison']),
    operator: await of(networkId, ['operator']),
    administrator: await of(null, [], true),
  };
}

/** What a browser sends for the form of a new station that is filled in well. */
export const STATION_FORM = {
  act: 'save',
  name: 'Ropewalk School',
  code: 'MER-09',
  latitude: '54,1032',
  longitude: '\u22121.5907',
  placement: 'facade',
  facadeCorrection: '3',
  mastHeight: '4.5',
  surroundings: '',
  bandFraction: '3',
  firstBandHz: '25',
  lastBandHz: '10000',
  intervalSeconds: '60',
  acceptsFrom: '',
};

/** A request as a browser posts a form. */
export function postedForm(fields: Record<string, string>): Request {
  return new Request('http://127.0.0.1:4321/form', { method: 'POST', body: new URLSearchParams(fields) });
}
