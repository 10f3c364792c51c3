import { requireUser } from '#lib/auth/guards';
import { networksOf } from '#lib/auth/networkAccess';
import { type Me } from '#lib/contracts/people';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const GET = route(async (context) => {
  const user = requireUser(context);
  const networks = await networksOf(user);
  const me: Me = {
    name: user.name,
    email: user.email,
    isAdministrator: user.isAdministrator,
    networks: networks.map(({ network, roles }) => ({ slug: network.slug, name: network.name, roles })),
  };
  return json(me);
});
