import { calibrationSettingsSchema } from '#lib/contracts/calibrations';
import { typedNumber, type FormValues } from '#lib/http/forms';
import { idOf } from '#lib/http/outcome';
import { badRequest, notAllowed, notFound } from '#lib/http/problem';
import { changeCalibrationSettings } from '#lib/services/calibrations/settings';
import { endFeed, makeFeed } from '#lib/services/people/feeds';

interface Owner {
  networkId: number;
  userId: string;
}

/**
 * Does what a form of the page asks: settings are an operator's, a calendar's address is anybody's own.
 * @returns the token of the feed just made, to be shown once, or null.
 * @throws {Problem} and zod errors, with what is wrong by field.
 */
export async function settingsFromForm(
  { text }: FormValues,
  owner: Owner,
  mayChange: boolean,
): Promise<string | null> {
  switch (text['act']) {
    case 'save': {
      if (!mayChange) throw notAllowed();
      const settings = calibrationSettingsSchema.parse(settingsOf(text));
      await changeCalibrationSettings(owner.networkId, settings, owner.userId);
      return null;
    }
    case 'make-feed':
      return makeFeed(owner, 'calendar');
    case 'end-feed':
      if (await endFeed(owner, 'calendar', idOf(text['feed']))) return null;
      throw notFound('This address has been ended already.');
    default:
      throw badRequest('The form did not say what to do. Nothing was changed.');
  }
}

function settingsOf(text: FormValues['text']) {
  return {
    driftBound: typedNumber(text['driftBound']),
    checkEveryDays: typedNumber(text['checkEveryDays']),
    remindBeforeDays: typedNumber(text['remindBeforeDays']),
    recipients: (text['recipients'] ?? '').split(/[\s,;]+/).filter((address) => address !== ''),
  };
}
