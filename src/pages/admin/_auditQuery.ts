import { DateTime } from 'luxon';
import { auditChoices } from '#lib/services/audit/trail';

const MOST_TEXT = 100;

/** What the address asks of the trail, and what can be chosen; dates are days of `zone`. A name that is not known finds nothing. */
export async function auditQuery(url: URL, zone: string) {
  const choices = await auditChoices();
  const asked = (name: string) => url.searchParams.get(name)?.trim() ?? '';
  const [person, network, action, text] = [
    asked('person'),
    asked('network'),
    asked('action'),
    asked('text').slice(0, MOST_TEXT),
  ];
  const [from, to] = [dayOf(asked('from'), zone), dayOf(asked('to'), zone)];
  const networkId = choices.networks.find(({ slug }) => slug === network)?.id ?? 0;
  const filter = {
    userId: person || undefined,
    networkId: network === '' ? undefined : networkId,
    action: action || undefined,
    text: text || undefined,
    fromAt: from?.toJSDate(),
    // The day named last is looked at, too.
    toAt: to?.plus({ days: 1 }).toJSDate(),
  };
  const typed = { person, network, action, text, from: from?.toISODate() ?? '', to: to?.toISODate() ?? '' };
  return { choices, typed, filter };
}

/** Midnight at which a date begins; undefined where the text is none. */
function dayOf(text: string, zone: string): DateTime | undefined {
  const day = /^\d{4}-\d{2}-\d{2}$/.test(text) ? DateTime.fromISO(text, { zone }) : null;
  // From the year 1000 on, as the database counts.
  return day?.isValid && day.year >= 1000 ? day.startOf('day') : undefined;
}
