import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { MOST_PHOTO_BYTES, newPhotoSchema } from '#lib/contracts/photos';
import { valueOf } from '#lib/http/outcome';
import { readBytes } from '#lib/http/readBytes';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { addPhoto, photosOf } from '#lib/services/photos/photos';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  return json({ items: await photosOf(station.id), next: null });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  const query = context.url.searchParams;
  const input = newPhotoSchema.parse({
    caption: query.get('caption') ?? '',
    takenOn: query.get('takenOn') ?? '',
  });
  const bytes = await readBytes(context.request, MOST_PHOTO_BYTES);
  const photo = valueOf(await addPhoto({ station, userId: user.id }, input, bytes));
  return json({ photo }, { status: 201 });
});
