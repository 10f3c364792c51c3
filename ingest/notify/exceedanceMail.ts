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

export interface MailFrame {
  /** What several changes are called together in the subject; a single one says it itself. */
  subject: { before: string; several: string };
  /** Said before the changes; null: they say it all. */
  opening: string | null;
  /** Why the recipient gets it, and where that is changed. */
  closing: readonly string[];
  /** Where those are that the message has no room for. */
  listUrl: string;
}

/** A message tells of so many windows; the list has the others. */
const MOST_TOLD = 50;

/** One message for the exceedances that one recipient is told of together. */
export function exceedanceMail(changes: readonly ToldChange[], frame: MailFrame): MailContent {
  const [first] = changes;
  if (!first) throw new RangeError('There is nothing to tell.');
  const { before, several } = frame.subject;
  const subject = before + (changes.length === 1 ? `${first.station}: ${first.headline}` : several);
  const shown = changes.slice(0, MOST_TOLD);
  const opening = frame.opening === null ? [] : [frame.opening];
  const closing = [...omitted(changes.length - shown.length, frame), ...frame.closing];
  return {
    subject: singleLine(subject),
    text: [...opening, ...shown.map(textOf), ...closing, ''].join('\n\n'),
    html: htmlOf(opening, shown, closing),
  };
}

function omitted(count: number, { listUrl }: MailFrame): string[] {
  return count > 0 ? [`${count} more are in the list: ${listUrl}`] : [];
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

function htmlOf(
  opening: readonly string[],
  changes: readonly ToldChange[],
  closing: readonly string[],
): string {
  const paragraphs = opening.map((line) => `<p>${escapeHtml(line)}</p>`);
  const ending = closing.map((line) => `<p style="color:#5a6660;font-size:13px">${escapeHtml(line)}</p>`);
  return (
    `<!doctype html><html lang="en"><body style="font:15px/1.5 'Noto Sans',sans-serif;color:#22302a">` +
    `${paragraphs.join('')}${changes.map(sectionOf).join('')}${ending.join('')}</body></html>`
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
