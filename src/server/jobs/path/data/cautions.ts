/** The usual cautions, each shown with every check that names it. Common practice; the maker's instructions come first. */
export const CAUTIONS = {
  crank:
    'Out of gear, brake on. Hands, hair, leads and tools clear of belts, fan and pulleys before anybody cranks.',
  short: 'Crank in short bursts and let the starter cool; unburnt fuel harms the catalyst.',
  spark:
    'Grounded tester with an adjustable gap only. Ignition voltage reaches tens of kilovolts: never touch or hold leads while cranking.',
  injectionOff: 'Injection off for the spark test. Away from fuel vapour and starting fluid.',
  openSecondary: 'Never run a coil with its secondary open.',
  primary:
    'The primary kick reaches some hundreds of volts: input rated for 400 V or an attenuator, scope ground at battery negative, mains-powered scopes isolated.',
  probe:
    'Back-probe with the connector in place; do not pierce insulation. Mind high-voltage and air-bag circuits (yellow or orange).',
  noOhmmeter:
    'Never an ohmmeter on a Hall or magneto-resistive sensor: only on a pick-up known to be two-wire.',
  battery: 'Eye protection at the battery, no sparks or flames near it, no bridged tools.',
  keyOut: 'Engine off, key out. Turn by hand only. Hot parts close by.',
  compression: 'Ignition and injection disabled, throttle open. Loosen plugs on a cool engine.',
  liquid:
    'Slow or locked cranking may be liquid in a cylinder: stop, plugs out first. Stand clear of the plug holes: what is in there comes out.',
  belt: 'Belt slip suspected: no cranking until it is ruled out, valves may strike pistons.',
  fuelPressure:
    'Relieve fuel pressure first by the maker’s method. Never open a rail valve by hand under pressure. High-pressure rails of direct injection: maker’s method only.',
  fuelVapour:
    'Eye protection, extinguisher at hand, ventilate, no ignition source. Catch and wipe what drips.',
  startingFluid:
    'One short burst into the intake, cap on, can away before cranking. Never near a spark, a flame or a heated intake, never where the maker forbids it.',
  hybrid:
    'On hybrids the high-voltage machine may turn the engine: cranking checks do not apply. Trained people only.',
  lift: 'Work under the vehicle only on stands; hot exhaust.',
  exhaustGas: 'Running engine: extraction or open air.',
  plugOut: 'Key out and wait before a control unit or sensor is unplugged.',
} as const;
export type CautionId = keyof typeof CAUTIONS;
