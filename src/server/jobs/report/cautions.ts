/** Shown with every report; common practice, no source, except where the maker says otherwise. */
export const CAUTIONS: readonly string[] = [
  'Ignition secondary circuits reach tens of kilovolts and the primary kick some hundreds of volts: rated probes and attenuators, ' +
    'hands off while cranking, every spark with a grounded path away from fuel vapour.',
  'Before cranking: out of gear, brake on, nobody at belts, fans and pulleys. Short bursts only.',
  'On hybrids the high-voltage machine may turn the engine: trained people only. Respect air-bag circuits.',
];

export const DISCLAIMER =
  'This report shows measurements and how they compare; it certifies nothing. The maker’s service information, local rules and a ' +
  'qualified technician’s judgement come first.';
