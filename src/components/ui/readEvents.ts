/** Reads server-sent events of a body until it ends: name and JSON of each. */
export async function readEvents(
  body: ReadableStream<Uint8Array>,
  hear: (name: string, data: unknown) => void,
): Promise<void> {
  const decoder = new TextDecoder();
  const reader = body.getReader();
  let text = '';
  for (;;) {
    const { done, value } = await reader.read();
    if (done) return;
    text += decoder.decode(value, { stream: true });
    const events = text.split('\n\n');
    text = events.pop() ?? '';
    for (const event of events) {
      const match = /^event: (.*)\ndata: (.*)$/.exec(event);
      if (match?.[1] && match[2]) hear(match[1], JSON.parse(match[2]));
    }
  }
}
