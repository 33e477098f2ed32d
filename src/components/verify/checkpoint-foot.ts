/** A signed head as the foot of public pages shows it, times in the series' own zone. */
export const checkpointFoot = (
  head: {
    readonly number: number;
    readonly size: number;
    readonly root: string;
    readonly signedAt: string;
  },
  zone: string,
) => ({
  number: head.number,
  lines: head.size,
  head: `${head.root.slice(0, 16)}…`,
  signedAt: localTime(head.signedAt, zone),
});

/** `2026-07-12 21:14 CDT` */
export const localTime = (instant: string, zone: string): string => {
  const parts = new Intl.DateTimeFormat('en-CA', {
    timeZone: zone,
    dateStyle: undefined,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZoneName: 'short',
  }).formatToParts(new Date(instant));
  const part = (type: Intl.DateTimeFormatPartTypes) =>
    parts.find((one) => one.type === type)?.value ?? '';
  const day = `${part('year')}-${part('month')}-${part('day')}`;
  return `${day} ${part('hour')}:${part('minute')} ${part('timeZoneName')}`;
};
