const MINUTE_SEC = 60;
const HOUR_SEC = 3600;
const DAY_SEC = 86_400;

/** A length of time, exactly, in at most two units: "45 s", "15 min", "1 h 30 min", "36 h", "3 days 4 h", "31 days". */
export function formatDuration(durationSec: number): string {
  const sec = Math.round(durationSec);
  if (sec < MINUTE_SEC) return `${sec} s`;
  if (sec < HOUR_SEC) return pair(sec, MINUTE_SEC, 'min', 1, 's');
  if (sec <= 2 * DAY_SEC) return pair(sec, HOUR_SEC, 'h', MINUTE_SEC, 'min');
  return pair(sec, DAY_SEC, 'days', HOUR_SEC, 'h');
}

/** How long ago, in one unit rounded down: "just now", "40 s ago", "3 min ago", "5 h ago", "12 days ago". */
export function formatAgo(atSec: number, nowSec: number): string {
  const sec = Math.max(0, Math.floor(nowSec - atSec));
  if (sec < 5) return 'just now';
  if (sec < 2 * MINUTE_SEC) return `${sec} s ago`;
  if (sec < 2 * HOUR_SEC) return `${Math.floor(sec / MINUTE_SEC)} min ago`;
  if (sec < 2 * DAY_SEC) return `${Math.floor(sec / HOUR_SEC)} h ago`;
  return `${Math.floor(sec / DAY_SEC)} days ago`;
}

function pair(sec: number, bigSec: number, big: string, smallSec: number, small: string): string {
  const whole = Math.floor(sec / bigSec);
  const rest = Math.floor((sec - whole * bigSec) / smallSec);
  return rest === 0 ? `${whole} ${big}` : `${whole} ${big} ${rest} ${small}`;
}
