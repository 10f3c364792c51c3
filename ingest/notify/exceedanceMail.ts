import { escapeHtml } from '#lib/format/escapeHtml';
import type { ChangeWords } from './describeChange';

export interface MailContent {
  subject: string;
  text: string;
  html: string;
}

/** One message for the exceedances of a run that concern one recipient. */
export function exceedanceMail(
  networkName: string,
  changes: readonly ChangeWords[],
  settingsUrl: string,
): MailContent {
  const [first] = changes;
  if (!first) throw new RangeError('There is nothing to tell.');
  const subject =
    changes.length === 1
      ? `${first.station}: ${first.headline}`
      : `${networkName}: ${changes.length} windows above or no longer above a limit`;
  const closing = `You get this because your address is named in the limit: ${settingsUrl}`;
  return {
    subject: singleLine(subject),
    text: [...changes.map(textOf), closing, ''].join('\n\n'),
    html: htmlOf(changes, closing),
  };
}

function textOf({ station, headline, because, facts, exceedanceUrl, stripUrl }: ChangeWords): string {
  const lines = facts.map(([name, value]) => `  ${`${name}:`.padEnd(13)}${value}`);
  return [
    `${station}: ${headline}`,
    ...(because === null ? [] : [`  ${because}`]),
    ...lines,
    `  Cause and acknowledgement: ${exceedanceUrl}`,
    `  Spectrogram: ${stripUrl}`,
  ].join('\n');
}

function htmlOf(changes: readonly ChangeWords[], closing: string): string {
  const sections = changes.map(({ station, headline, because, facts, exceedanceUrl, stripUrl }) => {
    const rows = facts
      .map(
        ([name, value]) =>
          `<tr><td style="padding:2px 16px 2px 0;color:#5a6660">${escapeHtml(name)}</td><td>${escapeHtml(value)}</td></tr>`,
      )
      .join('');
    return (
      `<h2 style="font-size:17px;margin:24px 0 6px">${escapeHtml(station)}: ${escapeHtml(headline)}</h2>` +
      (because === null ? '' : `<p style="margin:0 0 6px">${escapeHtml(because)}</p>`) +
      `<table>${rows}</table>` +
      `<p><a href="${escapeHtml(exceedanceUrl)}">Cause and acknowledgement</a> · <a href="${escapeHtml(stripUrl)}">Spectrogram</a></p>`
    );
  });
  return (
    `<!doctype html><html lang="en"><body style="font:15px/1.5 'Noto Sans',sans-serif;color:#22302a">${sections.join('')}` +
    `<p style="color:#5a6660;font-size:13px">${escapeHtml(closing)}</p></body></html>`
  );
}

function singleLine(text: string): string {
  return text.replace(/\s+/g, ' ').trim();
}
