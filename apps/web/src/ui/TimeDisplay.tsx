import { useNow } from '../lib/useNow';
import { describeInstant, formatAgo, formatInstant, formatRemaining } from '../lib/time';

export interface TimeDisplayProps {
  /** ISO 8601 in UTC, as on the wire. */
  instant: string | null | undefined;
  siteTimeZone?: string | undefined;
  /** Only UTC, for dense tables; the other zones are in the title. */
  short?: boolean;
}

/** An instant: UTC first, then site and own time, each labelled. */
export function TimeDisplay({ instant, siteTimeZone, short = false }: TimeDisplayProps) {
  if (!instant) return <>—</>;
  const date = new Date(instant);
  const all = describeInstant(date, siteTimeZone);
  return (
    <time dateTime={instant} title={short ? all : undefined}>
      {short ? `${formatInstant(date, 'UTC')} UTC` : all}
    </time>
  );
}

/** Time left until an instant: `6 d 04 h`, by the second within the last hour. Not announced: it would never stop. */
export function Countdown({ until, passed = 'passed' }: { until: string; passed?: string }) {
  const end = Date.parse(until);
  const now = useNow(1000);
  return (
    <time dateTime={until} aria-live="off">
      {end - now <= 0 ? passed : formatRemaining(end - now)}
    </time>
  );
}

/** `12 s ago`. */
export function Ago({ since }: { since: number }) {
  const now = useNow(1000);
  return <>{formatAgo(now - since)}</>;
}
