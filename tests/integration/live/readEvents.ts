export interface EventReader {
  /** Data of the next event of this name; null when the stream ends before it. */
  next: (name: string) => Promise<unknown>;
  cancel: () => Promise<void>;
}

/** Reads server-sent events one after the other. */
export function readEvents(response: Response): EventReader {
  if (!response.body) throw new Error('The answer has no body.');
  const reader = response.body.getReader();
  const decoder = new TextDecoder();
  let text = '';
  const nextBlock = async (): Promise<string | null> => {
    for (;;) {
      const end = text.indexOf('\n\n');
      if (end >= 0) {
        const block = text.slice(0, end);
        text = text.slice(end + 2);
        return block;
      }
      const { value, done } = await reader.read();
      if (done) return null;
      text += decoder.decode(value, { stream: true });
    }
  };
  const next = async (name: string): Promise<unknown> => {
    for (;;) {
      const block = await nextBlock();
      if (block === null) return null;
      const lines = block.split('\n');
      if (!lines.includes(`event: ${name}`)) continue;
      return JSON.parse(lines.find((line) => line.startsWith('data: '))?.slice(6) ?? 'null');
    }
  };
  return { next, cancel: () => reader.cancel() };
}
