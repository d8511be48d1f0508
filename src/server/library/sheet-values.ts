import type { RelationFindings, SignalFindings } from '../../engine/capture.ts';

/** What a sheet shows of a signal at a glance, first ones first. */
const SHOWN = [
  'peak_to_peak',
  'rpm_mean',
  'cam_rising_angles',
  'dwell',
  'kick_peak',
  'burn_time',
  'burn_level',
  'peak_current',
  'time_constant',
  'pulse_width',
  'clamp_peak',
  'inrush_peak',
  'compression_rate',
  'level_low',
  'level_high',
  'rest_level',
  'lowest',
  'cranking_mean',
] as const;
const MOST = 4;

export interface SheetValue {
  readonly key: string;
  readonly value: number;
  readonly unit: string;
}

/** The few numbers of one signal that its sheet shows; what is a list or null is left out. */
export function sheetValues(
  findings: { readonly signals: readonly SignalFindings[]; readonly relations: readonly RelationFindings[] },
  index: number,
): SheetValue[] {
  const values = findings.signals.find((signal) => signal.index === index)?.values ?? [];
  return SHOWN.flatMap((key) => {
    const found = values.find((value) => value.key === key);
    return typeof found?.value === 'number' ? [{ key, value: found.value, unit: found.unit }] : [];
  }).slice(0, MOST);
}
