import { config } from '#lib/config/index';
import type { TroubleRow } from '#db/queries/health';
import type { NetworkRow } from '#db/queries/networks';
import type { TroubleKind } from '#lib/contracts/health';
import { formatDuration } from '#lib/format/durations';
import { formatInstant, formatPeriod, formatZone } from '#lib/format/times';
import { kindOf } from '#lib/services/health/troubleJson';
import { troubleAdvice, troubleWhat } from '#lib/services/health/troubleWords';
import type { Note } from './mail';

interface Beginning {
  station: { code: string; name: string };
  kind: TroubleKind;
  beginsAtSec: number;
  measured: number | null;
  bound: number | null;
}

/** The message that a trouble has begun: what, where, since when, what to do. */
export function beginNote(trouble: Beginning, network: NetworkRow, zone: string): Note {
  const { station, kind, beginsAtSec } = trouble;
  const what = troubleWhat(trouble);
  const around = { fromSec: beginsAtSec, toSec: beginsAtSec + 1 };
  return {
    subject: `${station.code} ${station.name}: ${what}`,
    opening: `${station.code} ${station.name}: ${what}.`,
    facts: [
      ['Since', `${formatInstant(minuteOf(beginsAtSec), zone)}, ${formatZone(zone, around)}`],
      ['What to do', troubleAdvice(kind)],
    ],
    ...ending(network),
  };
}

/** The message that a trouble is over: how long it lasted. */
export function overNote(trouble: TroubleRow, endsAtSec: number, network: NetworkRow, zone: string): Note {
  const { stationCode, stationName, beginsAtSec } = trouble;
  const what = troubleWhat({ ...trouble, kind: kindOf(trouble) });
  const span = {
    fromSec: minuteOf(beginsAtSec),
    toSec: Math.max(minuteOf(endsAtSec), minuteOf(beginsAtSec) + 60),
  };
  return {
    subject: `${stationCode} ${stationName}: over: ${what}`,
    opening: `${stationCode} ${stationName}: this is over: ${what}.`,
    facts: [
      [
        'Lasted',
        `${formatDuration(span.toSec - span.fromSec)}: ${formatPeriod(span, zone)}, ${formatZone(zone, span)}`,
      ],
    ],
    ...ending(network),
  };
}

function ending(network: NetworkRow): Pick<Note, 'link' | 'closing'> {
  const url = `${config().origin}/n/${network.slug}/health`;
  return {
    link: { label: 'Health of the network', url },
    closing: `One message when a trouble begins, one when it is over. Who is told, and the bounds: ${url}/settings`,
  };
}

const minuteOf = (sec: number) => Math.floor(sec / 60) * 60;
