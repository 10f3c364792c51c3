import { type PhotoType } from '#lib/contracts/photos';
import { plainJpeg } from './plainJpeg';
import { plainPng } from './plainPng';

export interface PlainPhoto {
  type: PhotoType;
  bytes: Uint8Array<ArrayBuffer>;
}

/** A photo as it is kept: what it is by its own bytes, nothing but the picture; null when it is none that is taken. */
export function plainPhoto(bytes: Uint8Array): PlainPhoto | null {
  const jpeg = plainJpeg(bytes);
  if (jpeg) return { type: 'image/jpeg', bytes: jpeg };
  const png = plainPng(bytes);
  return png && { type: 'image/png', bytes: png };
}
