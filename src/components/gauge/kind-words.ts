import type { GaugeKind } from '@/domain/measurement/gauge';
import { dayAndClockWords, shortDay } from '@/domain/verdict/instant-words';

export const KIND_WORDS: Readonly<Record<GaugeKind, string>> = {
  micrometer: 'Micrometer',
  'dial-bore-gauge': 'Dial bore gauge',
  'telescoping-gauge': 'Telescoping gauge',
  caliper: 'Caliper',
  'setting-ring': 'Setting ring',
  'plug-gauge': 'Plug gauge',
  scale: 'Scale',
  other: 'Other',
};

/** Since when what a gauge read is in doubt; a calibration is a day, a check an instant. */
export const doubtWords = (
  because: string,
  at: string | null | undefined,
  zone: string,
): string => {
  if (at === null || at === undefined) return `ever: there is ${because}`;
  const when = at.endsWith('T00:00:00.000Z')
    ? shortDay(at.slice(0, 10))
    : dayAndClockWords(at, zone);
  return `since ${because}, ${when}`;
};
