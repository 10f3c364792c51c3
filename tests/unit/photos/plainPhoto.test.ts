import { deflateSync } from 'node:zlib';
import { describe, expect, test } from 'vitest';
import { orientationOf, orientationSegment } from '#lib/services/photos/orientation';
import { plainPhoto } from '#lib/services/photos/plainPhoto';
import { chunk, jpegOf, PNG_SIGNATURE, SCAN, segment, TABLE } from './builtPhotos';

const text = (bytes: Uint8Array | undefined) => Buffer.from(bytes ?? []).toString('latin1');

describe('a JPEG', () => {
  const exif = segment(
    0xe1,
    Buffer.concat([Buffer.from('Exif\0\0II*\0\b\0\0\0\0\0'), Buffer.from('GPS 54.1N')]),
  );
  const file = jpegOf([
    segment(0xe0, Buffer.from('JFIF\0\x01\x02')),
    exif,
    segment(0xe1, Buffer.from('http://ns.adobe.com/xap/1.0/\0<x:xmpmeta/>')),
    segment(0xe2, Buffer.from('MPF\0second image')),
    segment(0xe2, Buffer.from('ICC_PROFILE\0\x01\x01profile')),
    segment(0xed, Buffer.from('Photoshop 3.0\0who took it')),
    segment(0xfe, Buffer.from('a comment')),
    TABLE,
  ]);

  test('keeps the picture and its colours, and nothing of place, time, camera or what follows its end', () => {
    const plain = plainPhoto(Buffer.concat([file, Buffer.from('a hidden film')]));
    expect(plain?.type).toBe('image/jpeg');
    for (const gone of ['GPS', 'xmpmeta', 'MPF', 'Photoshop', 'comment', 'film']) {
      expect(text(plain?.bytes)).not.toContain(gone);
    }
    expect(Buffer.from(plain?.bytes ?? [])).toEqual(
      jpegOf([
        segment(0xe0, Buffer.from('JFIF\0\x01\x02')),
        segment(0xe2, Buffer.from('ICC_PROFILE\0\x01\x01profile')),
        TABLE,
      ]),
    );
  });

  test('of several scans keeps them all, without comments between them', () => {
    const comment = segment(0xfe, Buffer.from('between'));
    const plain = plainPhoto(jpegOf([TABLE, SCAN, comment, TABLE]));
    expect(Buffer.from(plain?.bytes ?? [])).toEqual(jpegOf([TABLE, SCAN, TABLE]));
  });

  test('stays the right way up', () => {
    for (const isLittle of [true, false]) {
      const tiff = Buffer.alloc(22);
      tiff.write(isLittle ? 'II*\0' : 'MM\0*', 'latin1');
      const uint16 = (value: number, at: number) =>
        isLittle ? tiff.writeUInt16LE(value, at) : tiff.writeUInt16BE(value, at);
      if (isLittle) tiff.writeUInt32LE(8, 4);
      else tiff.writeUInt32BE(8, 4);
      uint16(1, 8);
      uint16(0x0112, 10);
      uint16(6, 18);
      const body = Buffer.concat([Buffer.from('Exif\0\0'), tiff]);
      const plain = plainPhoto(jpegOf([segment(0xe1, body), TABLE]));
      const kept = Buffer.from(plain?.bytes ?? []);
      expect(kept).toEqual(jpegOf([...orientationSegment(6), TABLE]));
      expect(orientationOf(kept.subarray(6))).toBe(6);
    }
  });

  test('cut anywhere is refused, or is a shorter file that never has the metadata', () => {
    for (let length = 0; length < file.length; length += 1) {
      expect(plainPhoto(file.subarray(0, length))).toBeNull();
    }
  });
});

describe('a PNG', () => {
  const head = chunk('IHDR', Buffer.alloc(13, 1));
  const data = chunk('IDAT', deflateSync(Buffer.alloc(4)));
  const end = chunk('IEND', Buffer.alloc(0));
  const colours = chunk('gAMA', Buffer.alloc(4, 1));
  const file = Buffer.concat([
    PNG_SIGNATURE,
    head,
    colours,
    chunk('eXIf', Buffer.from('GPS')),
    chunk('tEXt', Buffer.from('Author\0somebody')),
    chunk('tIME', Buffer.alloc(7)),
    data,
    end,
  ]);

  test('keeps the picture and its colours only', () => {
    const plain = plainPhoto(Buffer.concat([file, Buffer.from('more')]));
    expect(plain?.type).toBe('image/png');
    expect(Buffer.from(plain?.bytes ?? [])).toEqual(Buffer.concat([PNG_SIGNATURE, head, colours, data, end]));
  });

  test('cut anywhere, or without its head, is refused', () => {
    for (let length = 0; length < file.length; length += 1) {
      expect(plainPhoto(file.subarray(0, length))).toBeNull();
    }
    expect(plainPhoto(Buffer.concat([PNG_SIGNATURE, data, end]))).toBeNull();
  });
});

test('anything else is no photo, whatever it calls itself', () => {
  for (const other of ['<svg xmlns="http://www.w3.org/2000/svg"/>', '%PDF-1.7', 'GIF89a', '<html>', '']) {
    expect(plainPhoto(Buffer.from(other))).toBeNull();
  }
});
