import { selectWeather } from '#db/queries/weatherRecords';
import { meanWind, type MeanWind } from '#lib/acoustics/mastWeather';
import { type WindStep } from '#lib/contracts/weather';
import { type Span } from '../levels/spans';

const HOUR_SEC = 3600;
const MOST_STEPS = 96;
/** Two months of minutes are read at once, no more. */
const LONGEST_SEC = 62 * 86_400;

/** A mast's wind of a period and of its steps of whole hours, 96 at most; null for a period of more than 62 days. */
export async function windSteps(
  mastId: number,
  period: Span,
): Promise<{ steps: WindStep[]; whole: MeanWind | null } | null> {
  if (period.toSec - period.fromSec > LONGEST_SEC) return null;
  const records = await selectWeather(mastId, period.fromSec, period.toSec, 0);
  const stepSec = Math.ceil((period.toSec - period.fromSec) / MOST_STEPS / HOUR_SEC) * HOUR_SEC;
  const steps: WindStep[] = [];
  for (let fromSec = period.fromSec; fromSec < period.toSec; fromSec += stepSec) {
    const span = { fromSec, toSec: Math.min(fromSec + stepSec, period.toSec) };
    const within = records.filter(({ startSec }) => startSec >= span.fromSec && startSec < span.toSec);
    const rain = within.flatMap(({ rainMm }) => rainMm ?? []);
    const rainMm = rain.length === 0 ? null : rain.reduce((sum, mm) => sum + mm, 0);
    steps.push({ ...span, wind: meanWind(records, span), rainMm });
  }
  return { steps, whole: meanWind(records, period) };
}
