import type { GaugeKind } from '@/domain/measurement/gauge';

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
