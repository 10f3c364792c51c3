import { requireNetwork } from '#lib/auth/guards';
import { newNoteSchema } from '#lib/contracts/complaintDeskRoutes';
import { requireDone, unknownComplaint } from '#lib/http/deskOutcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { notesOf } from '#lib/services/complaints/desk/forInterface';
import { addNote } from '#lib/services/complaints/desk/notes';

export const GET = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['liaison']);
  const notes = await notesOf({ userId: user.id, network, reference: context.params.reference ?? '' });
  if (!notes) throw unknownComplaint();
  return json(notes);
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['liaison']);
  const { text } = await readJson(context.request, newNoteSchema);
  const act = { userId: user.id, network, reference: context.params.reference ?? '' };
  return json({ id: requireDone(await addNote(act, text)).noteId }, { status: 201 });
});
