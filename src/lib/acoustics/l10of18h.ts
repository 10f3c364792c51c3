/** Hours 06–24 of one local date, whose L10 are averaged. */
const HOURS = 18;

/**
 * L10,18h in dB: the *arithmetic* mean of the hourly L10 of the 18 hours 06:00–24:00. The one place where levels are averaged
 * arithmetically, because that is its definition (TRRL digest, https://trid.trb.org/View/65887). Null when an hour has none.
 * Reported as whole dB, half up.
 * @throws RangeError unless there are 18 hours.
 */
export function l10of18hDb(hourlyL10Db: readonly (number | null)[]): number | null {
  if (hourlyL10Db.length !== HOURS)
    throw new RangeError(`L10,18h needs ${HOURS} hours, not ${hourlyL10Db.length}.`);
  let sumDb = 0;
  for (const levelDb of hourlyL10Db) {
    if (levelDb === null) return null;
    sumDb += levelDb;
  }
  return sumDb / HOURS;
}
