import {
  closeSync,
  fsyncSync,
  mkdirSync,
  openSync,
  readdirSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { dirname, join } from 'node:path';
import { simpleParser, type AddressObject, type Attachment, type ParsedMail } from 'mailparser';

export interface StoredMail {
  /** Name of its file without ending; sorts by arrival. */
  id: string;
  parsed: ParsedMail;
  /** Addresses of the SMTP envelope, which decide who got it. */
  recipients: string[];
}

/** Received messages, each a `.eml` file with its envelope beside it, on disk before the sender is told so. */
export class MailStore {
  private readonly mails = new Map<string, StoredMail>();
  private counter = 0;

  constructor(private readonly directory: string) {
    mkdirSync(directory, { recursive: true, mode: 0o700 });
  }

  /** Reads what earlier runs received. */
  async load(): Promise<void> {
    for (const name of readdirSync(this.directory).filter((file) => file.endsWith('.eml'))) {
      const id = name.slice(0, -'.eml'.length);
      const source = readFileSync(join(this.directory, name));
      const envelope = readFileSync(join(this.directory, `${id}.json`), 'utf8');
      await this.remember(id, source, JSON.parse(envelope) as string[]);
    }
  }

  async add(source: Buffer, recipients: string[]): Promise<void> {
    this.counter += 1;
    const id = `${Date.now().toString().padStart(14, '0')}-${String(this.counter).padStart(4, '0')}`;
    // The envelope first: a message without one would not be found again.
    writeDurably(join(this.directory, `${id}.json`), JSON.stringify(recipients));
    writeDurably(join(this.directory, `${id}.eml`), source);
    await this.remember(id, source, recipients);
  }

  /** Newest first; `to` and `subject` keep those that hold the text. */
  list({ to = '', subject = '' }: { to?: string; subject?: string } = {}): StoredMail[] {
    const has = (text: string, part: string) => text.toLowerCase().includes(part.toLowerCase());
    return [...this.mails.values()]
      .filter((mail) => mail.recipients.some((recipient) => has(recipient, to)))
      .filter((mail) => has(mail.parsed.subject ?? '', subject))
      .sort((a, b) => (a.id < b.id ? 1 : -1));
  }

  find(id: string): StoredMail | undefined {
    return this.mails.get(id);
  }

  clear(): void {
    for (const id of this.mails.keys()) {
      rmSync(join(this.directory, `${id}.eml`), { force: true });
      rmSync(join(this.directory, `${id}.json`), { force: true });
    }
    this.mails.clear();
  }

  private async remember(id: string, source: Buffer, recipients: string[]): Promise<void> {
    this.mails.set(id, { id, recipients, parsed: await simpleParser(source) });
  }
}

/** Addresses of a header, as they stand there. */
export function addressText(addresses: AddressObject | AddressObject[] | undefined): string {
  return [addresses ?? []]
    .flat()
    .map(({ text }) => text)
    .join(', ');
}

/** Attachments that the reader may save; pictures that stand in the text are not among them. */
export function attachmentsOf({ parsed }: StoredMail): Attachment[] {
  return parsed.attachments.filter(({ related }) => !related);
}

/** Writes a file and its entry in the directory through to the disk. */
function writeDurably(path: string, content: Buffer | string): void {
  writeFileSync(path, content, { mode: 0o600, flush: true });
  const directory = openSync(dirname(path), 'r');
  fsyncSync(directory);
  closeSync(directory);
}
