import { MOST_PHOTO_BYTES, newPhotoSchema } from '#lib/contracts/photos';
import type { PostedForm } from '#lib/http/forms';
import { idOf, valueOf } from '#lib/http/outcome';
import { badRequest, invalidFields } from '#lib/http/problem';
import { addPhoto, removePhoto, type PhotoAct } from '#lib/services/photos/photos';

/** Labels of the fields, by name. */
export const PHOTO_LABELS = {
  photo: 'Photo',
  caption: 'What it shows',
  takenOn: 'Taken on',
  confirmation: 'The station’s code',
} as const;

/**
 * Adds the photo that a form brings, or deletes the one that it names. `today` is the network's date.
 * @throws {Problem} and zod errors, by field.
 */
export async function actOnPhotos(form: PostedForm, act: PhotoAct, today: string): Promise<void> {
  if (form.text['act'] === 'add') return add(form, act, today);
  if (form.text['act'] !== 'delete') {
    throw badRequest('The form did not say what to do. Nothing was changed.');
  }
  const { code } = act.station;
  if (form.text['confirmation']?.toUpperCase() !== code.toUpperCase()) {
    throw invalidFields([{ field: 'confirmation', message: `must be ${code}, the station’s code` }]);
  }
  valueOf(await removePhoto(act, idOf(form.text['photoId'])));
}

async function add(form: PostedForm, act: PhotoAct, today: string): Promise<void> {
  const { caption = '', takenOn = '' } = form.text;
  const input = newPhotoSchema.parse({ caption, takenOn });
  if (takenOn > today) throw invalidFields([{ field: 'takenOn', message: 'must not be in the future' }]);
  const file = form.file('photo');
  if (!file) throw invalidFields([{ field: 'photo', message: 'choose a file' }]);
  if (file.size > MOST_PHOTO_BYTES) {
    throw invalidFields([{ field: 'photo', message: 'may have at most 8 MiB' }]);
  }
  valueOf(await addPhoto(act, input, new Uint8Array(await file.arrayBuffer())));
}
