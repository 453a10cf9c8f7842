/** `2027-03-31 18:00`, in the given IANA time zone. Years, months and days in that order everywhere. */
export function formatInstant(instant: Date, timeZone: string): string {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
  }).formatToParts(instant);
  const part = (type: Intl.DateTimeFormatPartTypes) => parts.find((one) => one.type === type)?.value ?? '';
  return `${part('year')}-${part('month')}-${part('day')} ${part('hour')}:${part('minute')}`;
}

/**
 * One instant in UTC, then at the site and in the person's own zone; the date is repeated only where it differs.
 * @throws RangeError for a zone that the browser does not know.
 */
export function describeInstant(instant: Date, siteTimeZone?: string, localTimeZone = browserTimeZone()): string {
  const utc = formatInstant(instant, 'UTC');
  const beside = (timeZone: string, label: string) => {
    const text = formatInstant(instant, timeZone);
    return ` · ${text.slice(0, 10) === utc.slice(0, 10) ? text.slice(11) : text} ${label}`;
  };
  return `${utc} UTC${siteTimeZone ? beside(siteTimeZone, 'site') : ''}${beside(localTimeZone, 'your time')}`;
}

function browserTimeZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone || 'UTC';
}

/** `6 d 04 h`, `04 h 12 min`, `3 min 05 s`; `passed` when nothing is left. */
export function formatRemaining(milliseconds: number): string {
  if (milliseconds <= 0) return 'passed';
  const seconds = Math.floor(milliseconds / 1000);
  const minutes = Math.floor(seconds / 60);
  const hours = Math.floor(minutes / 60);
  const two = (value: number) => String(value).padStart(2, '0');
  if (hours >= 24) return `${Math.floor(hours / 24)} d ${two(hours % 24)} h`;
  if (minutes >= 60) return `${hours} h ${two(minutes % 60)} min`;
  return `${minutes} min ${two(seconds % 60)} s`;
}

/** `just now`, `12 s ago`, `5 min ago`, then hours and days. */
export function formatAgo(milliseconds: number): string {
  const seconds = Math.max(0, Math.floor(milliseconds / 1000));
  if (seconds < 3) return 'just now';
  if (seconds < 60) return `${seconds} s ago`;
  if (seconds < 3600) return `${Math.floor(seconds / 60)} min ago`;
  if (seconds < 86_400) return `${Math.floor(seconds / 3600)} h ago`;
  return `${Math.floor(seconds / 86_400)} d ago`;
}
