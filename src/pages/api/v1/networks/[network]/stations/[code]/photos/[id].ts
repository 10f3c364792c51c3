import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { idOf, valueOf } from '#lib/http/outcome';
import { notFound } from '#lib/http/problem';
import { download, noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { pictureOf, removePhoto } from '#lib/services/photos/photos';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const id = idOf(context.params.id);
  const picture = await pictureOf(station.id, id);
  if (!picture) throw notFound('The station has no such photo.');
  const ending = picture.type === 'image/png' ? 'png' : 'jpg';
  const answer = download(
    new Uint8Array(picture.bytes),
    picture.type,
    `${station.code}-photo-${id}.${ending}`,
  );
  answer.headers.set('X-Content-Type-Options', 'nosniff');
  answer.headers.set('Content-Security-Policy', "default-src 'none'; sandbox");
  return answer;
});

export const DELETE = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  valueOf(await removePhoto({ station, userId: user.id }, idOf(context.params.id)));
  return noContent();
});
