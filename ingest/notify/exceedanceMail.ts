import { escapeHtml } from '#lib/format/escapeHtml';
import type { ChangeWords } from './describeChange';

export interface MailContent {
  subject: string;
  text: string;
  html: string;
}

/** A change as one recipient is told of it. */
export interface ToldChange extends ChangeWords {
  /** Where this person acknowledges it without signing in; null for whoever may not. */
  acknowledgeUrl: string | null;
}

export interface MailPlaces {
  limitsUrl: string;
  /** Where the recipient chooses what is sent; null for an address without an account. */
  alertsUrl: string | null;
  listUrl: string;
}

/** A message tells of so many windows; the list has the others. */
const MOST_TOLD = 50;

/** One message for the exceedances that one recipient is told of together. */
export function exceedanceMail(
  networkName: string,
  changes: readonly ToldChange[],
  places: MailPlaces,
): MailContent {
  const [first] = changes;
  if (!first) throw new RangeError('There is nothing to tell.');
  const subject =
    changes.length === 1
      ? `${first.station}: ${first.headline}`
      : `${networkName}: ${changes.length} windows above or no longer above a limit`;
  const shown = changes.slice(0, MOST_TOLD);
  const closing = [...omitted(changes.length - shown.length, places), ...whySent(places)];
  return {
    subject: singleLine(subject),
    text: [...shown.map(textOf), ...closing, ''].join('\n\n'),
    html: htmlOf(shown, closing),
  };
}

function omitted(count: number, { listUrl }: MailPlaces): string[] {
  return count > 0 ? [`${count} more are in the list: ${listUrl}`] : [];
}

function whySent({ limitsUrl, alertsUrl }: MailPlaces): string[] {
  const why = `You get this because your address is named in the limit: ${limitsUrl}`;
  return alertsUrl === null ? [why] : [why, `What you are sent, and when, you choose here: ${alertsUrl}`];
}

function textOf(change: ToldChange): string {
  const { station, headline, because, facts, exceedanceUrl, stripUrl } = change;
  const lines = facts.map(([name, value]) => `  ${`${name}:`.padEnd(13)}${value}`);
  return [
    `${station}: ${headline}`,
    ...(because === null ? [] : [`  ${because}`]),
    ...lines,
    ...(change.acknowledgeUrl === null
      ? []
      : [`  Acknowledge it without signing in: ${change.acknowledgeUrl}`]),
    `  Cause and acknowledgement: ${exceedanceUrl}`,
    `  Spectrogram: ${stripUrl}`,
  ].join('\n');
}

function htmlOf(changes: readonly ToldChange[], closing: readonly string[]): string {
  const ending = closing.map((line) => `<p style="color:#5a6660;font-size:13px">${escapeHtml(line)}</p>`);
  return (
    `<!doctype html><html lang="en"><body style="font:15px/1.5 'Noto Sans',sans-serif;color:#22302a">` +
    `${changes.map(sectionOf).join('')}${ending.join('')}</body></html>`
  );
}

function sectionOf(change: ToldChange): string {
  const { station, headline, because, facts, exceedanceUrl, stripUrl } = change;
  const rows = facts.map(
    ([name, value]) =>
      `<tr><td style="padding:2px 16px 2px 0;color:#5a6660">${escapeHtml(name)}</td><td>${escapeHtml(value)}</td></tr>`,
  );
  const links = [
    ...(change.acknowledgeUrl === null ? [] : [link(change.acknowledgeUrl, 'Acknowledge')]),
    link(exceedanceUrl, 'Cause and acknowledgement'),
    link(stripUrl, 'Spectrogram'),
  ];
  return (
    `<h2 style="font-size:17px;margin:24px 0 6px">${escapeHtml(station)}: ${escapeHtml(headline)}</h2>` +
    (because === null ? '' : `<p style="margin:0 0 6px">${escapeHtml(because)}</p>`) +
    `<table>${rows.join('')}</table><p>${links.join(' · ')}</p>`
  );
}

function link(url: string, label: string): string {
  return `<a href="${escapeHtml(url)}">${escapeHtml(label)}</a>`;
}

function singleLine(text: string): string {
  return text.replace(/\s+/g, ' ').trim();
}
