import { type StationRow } from '#db/queries/stations';
import { newStationSchema, stationChangesSchema } from '#lib/contracts/stations';
import { changeStation } from '#lib/services/stations/change';
import { typedInstant } from '#lib/services/stations/formValues';
import { registerStation } from '#lib/services/stations/register';
import { typedNumber, type FormValues } from './forms';
import { badRequest, invalidFields } from './problem';

/**
 * Registers the station that the form describes and answers it with its first token.
 * @throws {Problem} 422, and zod errors, with what is wrong by field.
 */
export async function registerFromForm(
  values: FormValues,
  { networkId, userId, zone }: { networkId: number; userId: string; zone: string },
) {
  const input = newStationSchema.parse({
    ...stationOfForm(values, zone),
    code: values.text['code'] ?? '',
    bandFraction: typedNumber(values.text['bandFraction']),
  });
  const registration = await registerStation(networkId, input, userId);
  if (registration.outcome === 'registered') return registration;
  throw invalidFields([{ field: 'code', message: 'belongs to another station of this network' }]);
}

/** Changes a station to what the form says. @throws {Problem} 422, and zod errors, with what is wrong by field. */
export async function changeFromForm(
  values: FormValues,
  station: StationRow,
  { userId, zone }: { userId: string; zone: string },
): Promise<void> {
  const change = await changeStation(
    station,
    stationChangesSchema.parse({
      ...stationOfForm(values, zone),
      placementFrom: typedInstant(values.text['placementFrom'] ?? '', zone),
    }),
    userId,
  );
  if (change.outcome === 'refused') throw invalidFields(change.fields);
}

/**
 * Retires a station or brings it back, with the reason that the form gives; retiring asks for the code once more.
 * @throws {Problem} 422, and zod errors, with what is wrong by field.
 */
export async function retireFromForm(
  { text }: FormValues,
  station: StationRow,
  userId: string,
): Promise<void> {
  const act = ACTS.find((known) => known === text['act']);
  if (!act) throw badRequest('The form did not say what to do. Nothing was changed.');
  const retired = act === 'retire';
  const { reason } = stationChangesSchema.required({ reason: true }).parse({ reason: text['reason'] ?? '' });
  if (retired && text['confirmation']?.toUpperCase() !== station.code.toUpperCase()) {
    throw invalidFields([{ field: 'confirmation', message: `must be ${station.code}, the station’s code` }]);
  }
  await changeStation(station, { retired, reason }, userId);
}

const ACTS = ['retire', 'bring-back'] as const;

/** What was typed into the station form, as the interface's JSON has it; its schema judges the values. An emptied field is no number. */
function stationOfForm({ text, all }: FormValues, zone: string) {
  return {
    name: text['name'] ?? '',
    latitude: typedNumber(text['latitude']) ?? NaN,
    longitude: typedNumber(text['longitude']) ?? NaN,
    placement: text['placement'],
    facadeCorrection: typedNumber(text['facadeCorrection']) ?? NaN,
    mastHeight: typedNumber(text['mastHeight']) ?? null,
    surroundings: text['surroundings'] ?? '',
    firstBandHz: typedNumber(text['firstBandHz']) ?? NaN,
    lastBandHz: typedNumber(text['lastBandHz']) ?? NaN,
    intervalSeconds: typedNumber(text['intervalSeconds']) ?? NaN,
    acceptsFrom: typedInstant(text['acceptsFrom'] ?? '', zone),
    expectedFlags: all('expectedFlags'),
  };
}
