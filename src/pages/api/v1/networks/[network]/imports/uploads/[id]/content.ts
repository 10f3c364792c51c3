import { addPart } from '#ingest/imports/uploads/addPart';
import { requireNetwork } from '#lib/auth/guards';
import { MOST_PART_BYTES } from '#lib/contracts/importUploads';
import { importIdOf, unknownUpload, uploadProblem } from '#lib/http/importOutcome';
import { parseContentRange } from '#lib/http/contentRange';
import { badRequest, Problem } from '#lib/http/problem';
import { readBytes } from '#lib/http/readBytes';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const PUT = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ['operator']);
  const { first, last, wholeBytes } = parseContentRange(context.request.headers.get('content-range'));
  const bytes = await readBytes(context.request, MOST_PART_BYTES);
  if (bytes.length !== last - first + 1) {
    throw badRequest('The part has another length than Content-Range says. Nothing of it was kept.');
  }
  const place = { networkId: network.id, id: importIdOf(context.params.id) };
  try {
    const outcome = await addPart(place, { first, wholeBytes }, bytes);
    if (outcome.kind === 'unknown') throw unknownUpload();
    if (outcome.kind === 'wrong-place') {
      const members = { offset: outcome.offset };
      throw new Problem(409, 'wrong-offset', 'Not the next part', outcome.message, { members });
    }
    return json({ upload: outcome.upload }, { headers: { 'Upload-Offset': String(outcome.upload.offset) } });
  } catch (error) {
    throw uploadProblem(error);
  }
});
