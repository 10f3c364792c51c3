import { requireSession } from '#lib/auth/guards';
import { beginOwnFactor, factorStateOf } from '#lib/auth/ownFactor';
import { type FactorState } from '#lib/contracts/secondFactor';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const GET = route(async (context) => {
  const { isOn, isRequired, recoveryCodesLeft } = await factorStateOf(requireSession(context).user);
  const state: FactorState = { isOn, isRequired, recoveryCodesLeft };
  return json(state);
});

export const POST = route(async (context) =>
  json(await beginOwnFactor(requireSession(context).user), { status: 201 }),
);
