/** Id of the block of data that the script below reads. */
export const EARLY_DATA_ID = 'early-columns';

/**
 * Asks for what the strip shows first while its scripts are on the way. The text never differs, so that the content security policy can name
 * it by its hash. An answer that fails is told to whoever takes it; the strip asks again then.
 */
export const EARLY_SCRIPT = `{
const { urls, headers } = JSON.parse(document.getElementById('${EARLY_DATA_ID}').textContent);
window.earlyAnswers = {};
for (const url of urls) {
  window.earlyAnswers[url] = fetch(url, { headers });
  window.earlyAnswers[url].catch(() => undefined);
}
}`;
