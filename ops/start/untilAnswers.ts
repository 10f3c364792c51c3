import { setTimeout as sleep } from 'node:timers/promises';

/** Waits until an address answers with success. @throws when it has not within `timeoutMs`. */
export async function untilAnswers(url: string, timeoutMs: number): Promise<void> {
  const deadline = Date.now() + timeoutMs;
  while (Date.now() < deadline) {
    const isUp = await fetch(url).then(
      (response) => response.ok,
      () => false,
    );
    if (isUp) return;
    await sleep(100);
  }
  throw new Error(`${url} did not answer within ${timeoutMs / 1000} s; see the logs.`);
}
