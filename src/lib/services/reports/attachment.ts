import type { AttachmentType } from '#lib/contracts/reports';

/** A file by its first bytes: what stands at which offset. */
const SIGNATURES: [type: AttachmentType, at: number, signature: string][] = [
  ['image/jpeg', 0, '\xff\xd8\xff'],
  ['image/png', 0, '\x89PNG\r\n\x1a\n'],
  ['audio/mpeg', 0, 'ID3'],
  ['audio/mpeg', 0, '\xff\xfb'],
  ['audio/mpeg', 0, '\xff\xf3'],
  ['audio/mp4', 4, 'ftypM4A'],
  ['audio/mp4', 4, 'ftypmp42'],
  ['audio/ogg', 0, 'OggS'],
  ['audio/wav', 8, 'WAVE'],
];

/** Endings for the file's name when it is saved at the desk. */
export const ATTACHMENT_ENDINGS: Readonly<Record<AttachmentType, string>> = {
  'image/jpeg': 'jpg',
  'image/png': 'png',
  'audio/mpeg': 'mp3',
  'audio/mp4': 'm4a',
  'audio/ogg': 'ogg',
  'audio/wav': 'wav',
};

/** What a file is, by its first bytes and by nothing that its sender says; null: none that is taken. */
export function attachmentTypeOf(bytes: Uint8Array): AttachmentType | null {
  const head = Buffer.from(bytes.subarray(0, 16)).toString('latin1');
  return SIGNATURES.find(([, at, signature]) => head.startsWith(signature, at))?.[0] ?? null;
}
