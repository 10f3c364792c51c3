import type { z } from 'zod';
import {
  COMPLAINT_EFFECTS,
  COMPLAINT_KINDS,
  contactSchema,
  type ComplaintEffect,
  type NewComplaint,
} from '#lib/contracts/complaints';
import {
  ELSEWHERE,
  MOST_ATTACHMENT_BYTES,
  MOST_WORDS_CHARACTERS,
  type AttachmentType,
  type ReportArea,
  type ReportFaults,
  type TypedReport,
} from '#lib/contracts/reports';
import type { Place } from '../complaints/whereabouts';
import { attachmentTypeOf } from './attachment';
import { reportWindow } from './reportWindow';

/** A report that can be kept. */
export interface ReadableReport {
  complaint: NewComplaint;
  effects: ComplaintEffect[];
  file: { type: AttachmentType; bytes: Buffer } | null;
}

export type ReadOutcome =
  { isReadable: true; report: ReadableReport } | { isReadable: false; faults: ReportFaults };

const PLACE = /^\s*([-−]?\d{1,2}(?:[.,]\d+)?)\s*[,;\s]\s*([-−]?\d{1,3}(?:[.,]\d+)?)\s*$/;

interface Surroundings {
  areas: readonly ReportArea[];
  timeZone: string;
  nowSec: number;
}

/** Reads what a resident typed; every field that is wrong is told at once. */
export function readReport(
  typed: TypedReport,
  fileBytes: Uint8Array | null,
  { areas, timeZone, nowSec }: Surroundings,
): ReadOutcome {
  const when = reportWindow(typed, timeZone, nowSec);
  const kind = COMPLAINT_KINDS.find((known) => known === typed.kind);
  const area = areas.find(({ name }) => name === typed.area);
  const place = readPlace(typed.place);
  const contact = contactSchema.safeParse({ ...pickContact(typed) });
  const type = fileBytes === null ? null : attachmentTypeOf(fileBytes);
  const faults: ReportFaults = {
    ...(when.isClear ? {} : when.faults),
    ...(kind ? {} : { kind: 'choose' }),
    ...(typed.words.length > MOST_WORDS_CHARACTERS ? { words: 'too-long-text' } : {}),
    ...whereFaults(typed, area, place),
    ...(contact.success ? {} : contactFaults(contact.error)),
    ...(typed.consent === 'yes' ? {} : { consent: 'consent' }),
    ...fileFaults(fileBytes, type),
  };
  if (!when.isClear || !kind || !contact.success || Object.keys(faults).length > 0) {
    return { isReadable: false, faults };
  }
  return {
    isReadable: true,
    report: {
      complaint: {
        from: when.window.fromSec,
        to: when.window.toSec,
        kind,
        latitude: place?.latitude ?? null,
        longitude: place?.longitude ?? null,
        // A typed place finds its nearest station by itself.
        station: place ? null : (area?.station ?? null),
        area: area?.name ?? null,
        words: typed.words.replaceAll('\r\n', '\n'),
        contact: contact.data,
      },
      effects: COMPLAINT_EFFECTS.filter((effect) => typed.effects.includes(effect)),
      file: fileBytes && type ? { type, bytes: Buffer.from(fileBytes) } : null,
    },
  };
}

function pickContact({ name, email, phone, address }: TypedReport) {
  return { name, email: email.trim(), phone, address };
}

/** A place typed as two decimal degrees; null when it is empty or none. */
function readPlace(text: string): Place | null {
  const [, latitude, longitude] = PLACE.exec(text) ?? [];
  const place = { latitude: degrees(latitude), longitude: degrees(longitude) };
  return Math.abs(place.latitude) <= 90 && Math.abs(place.longitude) <= 180 ? place : null;
}

function degrees(text: string | undefined): number {
  return Number((text ?? 'none').replace('−', '-').replace(',', '.'));
}

function whereFaults(
  typed: TypedReport,
  area: ReportArea | undefined,
  place: Place | null,
): Pick<ReportFaults, 'area' | 'place'> {
  if (typed.place.trim() !== '' && !place) return { place: 'unreadable-place' };
  if (!area && typed.area !== ELSEWHERE && !place) return { area: 'choose' };
  const isNowhere = !area && !place && typed.address.trim() === '';
  return isNowhere ? { area: 'where-at-all' } : {};
}

function contactFaults(error: z.ZodError): ReportFaults {
  const isWrong = (field: string) => error.issues.some(({ path }) => path[0] === field);
  return {
    ...(isWrong('name') ? { name: 'too-long-text' } : {}),
    ...(isWrong('email') ? { email: 'unreadable-email' } : {}),
    ...(isWrong('phone') ? { phone: 'too-long-text' } : {}),
    ...(isWrong('address') ? { address: 'too-long-text' } : {}),
  };
}

function fileFaults(bytes: Uint8Array | null, type: AttachmentType | null): Pick<ReportFaults, 'file'> {
  if (!bytes) return {};
  if (bytes.length > MOST_ATTACHMENT_BYTES) return { file: 'file-size' };
  return type ? {} : { file: 'file-type' };
}
