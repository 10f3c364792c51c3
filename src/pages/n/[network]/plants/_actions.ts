import { plantOfForm } from '#components/plants/plantForm.ts';
import { newPlantVersionSchema, plantRetirementSchema } from '#lib/contracts/plants';
import type { FormValues } from '#lib/http/forms';
import { valueOf } from '#lib/http/outcome';
import { badRequest } from '#lib/http/problem';
import { changePlant, retirePlant, type PlantAct } from '#lib/services/plants/change';

/**
 * Does what a form of a plant's page asks. The caller has made sure that the person is an operator.
 * @throws {Problem} and zod errors, with what is wrong by field.
 */
export async function actOnPlant(form: FormValues, act: PlantAct): Promise<void> {
  const { text } = form;
  switch (text['act']) {
    case 'change':
      valueOf(await changePlant(act, newPlantVersionSchema.parse(plantOfForm(form))));
      return;
    case 'retire':
    case 'bring-back': {
      const retirement = { retired: text['act'] === 'retire', reason: text['reason'] ?? '' };
      valueOf(await retirePlant(act, plantRetirementSchema.parse(retirement)));
      return;
    }
    default:
      throw badRequest('The form did not say what to do. Nothing was changed.');
  }
}
