import { randomBytes } from 'node:crypto';
import { config } from '#lib/config/index';
import { openSealed, sealBytes } from '../sealing';

/**
 * Personal data of a complaint rest under a random key of its own (AES-256-GCM), and that key rests wrapped by the
 * personal-data key of the settings. Destroying the wrapped key erases the person, in every backup of the data too.
 * The complaint's id and the purpose are authenticated with what is sealed.
 */

/** What sealed bytes are for. */
type Purpose = 'key' | ValuePurpose | FilePurpose;
/** What is sealed as bytes: what a resident sent, or a letter's PDF. */
type FilePurpose = 'attachment' | 'letter';
/** What is sealed as JSON. */
type ValuePurpose = 'person' | 'reply' | 'addition' | 'answer' | 'received' | 'note';

/** Sealed bytes that do not open: another key in the settings, or changed bytes. */
export class PersonalDataUnreadable extends Error {
  constructor(complaintId: number, cause?: unknown) {
    super(`Personal data of complaint ${complaintId} cannot be opened with the key of the settings.`, {
      cause,
    });
    this.name = 'PersonalDataUnreadable';
  }
}

/** A new random key for a complaint, wrapped for `complaint_keys`. */
export function newWrappedKey(complaintId: number): Buffer {
  return seal(config().personalDataKey, complaintId, 'key', randomBytes(32));
}

/** Seals a value (as JSON) under a complaint's wrapped key. @throws {PersonalDataUnreadable} */
export function sealValue(
  wrappedKey: Buffer,
  complaintId: number,
  purpose: ValuePurpose,
  value: unknown,
): Buffer {
  return seal(unwrap(wrappedKey, complaintId), complaintId, purpose, Buffer.from(JSON.stringify(value)));
}

/** The value that `sealValue` sealed; the caller validates it. @throws {PersonalDataUnreadable} */
export function openValue(
  wrappedKey: Buffer,
  complaintId: number,
  purpose: ValuePurpose,
  sealed: Buffer,
): unknown {
  return JSON.parse(open(unwrap(wrappedKey, complaintId), complaintId, purpose, sealed).toString('utf8'));
}

/** Seals a file under a complaint's wrapped key. @throws {PersonalDataUnreadable} */
export function sealFile(
  wrappedKey: Buffer,
  complaintId: number,
  bytes: Buffer,
  purpose: FilePurpose = 'attachment',
): Buffer {
  return seal(unwrap(wrappedKey, complaintId), complaintId, purpose, bytes);
}

/** The file that `sealFile` sealed. @throws {PersonalDataUnreadable} */
export function openFile(
  wrappedKey: Buffer,
  complaintId: number,
  sealed: Buffer,
  purpose: FilePurpose = 'attachment',
): Buffer {
  return open(unwrap(wrappedKey, complaintId), complaintId, purpose, sealed);
}

/** A complaint's key, wrapped by an earlier key of the settings, wrapped by theirs. @throws {PersonalDataUnreadable} where the earlier key is another one. */
export function rewrapKey(wrappedKey: Buffer, complaintId: number, before: Buffer): Buffer {
  return seal(config().personalDataKey, complaintId, 'key', open(before, complaintId, 'key', wrappedKey));
}

/** Whether the settings' key opens a complaint's wrapped key. */
export function opensKey(wrappedKey: Buffer, complaintId: number): boolean {
  try {
    unwrap(wrappedKey, complaintId);
    return true;
  } catch {
    return false;
  }
}

function unwrap(wrappedKey: Buffer, complaintId: number): Buffer {
  return open(config().personalDataKey, complaintId, 'key', wrappedKey);
}

function seal(key: Buffer, complaintId: number, purpose: Purpose, plain: Buffer): Buffer {
  return sealBytes(key, authenticated(complaintId, purpose), plain);
}

function open(key: Buffer, complaintId: number, purpose: Purpose, sealed: Buffer): Buffer {
  try {
    return openSealed(key, authenticated(complaintId, purpose), sealed);
  } catch (error) {
    throw new PersonalDataUnreadable(complaintId, error);
  }
}

const authenticated = (complaintId: number, purpose: Purpose) => `complaint ${complaintId} ${purpose} 1`;
