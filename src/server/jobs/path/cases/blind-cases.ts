import type { TradeCase } from './run-case.ts';

/**
 * The blind half: written before and apart from the data of the checks, by someone who had not seen them, in plain trade words
 * (`words`). Each was then put into the data's ids without changing what it says. What was not looked at is skipped. Where the data
 * had no finding for what was seen at first sight, README.md says what was added in general. Invented vehicles; common practice.
 */
export const BLIND_CASES: readonly TradeCase[] = [
  {
    name: 'Brennik Tala 1.6, 2009, 4 cylinders',
    complaint: 'cranks but does not start, no sound of any cylinder firing',
    // As written: crank position sensor gives no signal (open winding)
    cause: 'crank-sensor',
    others: 'nothing',
    answers: {
      cranking: {
        finding: 'usual',
        readings: [{ what: 'speed', value: 210, unit: 'rpm' }],
        words: 'cranking speed: 210 rev/min, even rhythm',
      },
      spark: { finding: 'none', words: 'spark at a tester on two cylinders while cranking: none' },
      'coil-feed': {
        finding: 'good',
        readings: [{ what: 'feed', value: 12.4, unit: 'V' }],
        words: 'coil feed with key on: 12.4 V',
      },
      'coil-command': { finding: 'none', words: 'coil command while cranking (scope): no pulses' },
      'crank-trace': {
        finding: 'none',
        words: 'crank sensor signal while cranking (scope): flat line at 0 V',
      },
      'injector-pulse': {
        finding: 'none',
        words: 'injector pulse while cranking: none, feed 12.3 V present',
      },
      'injector-feed': {
        finding: 'good',
        readings: [{ what: 'feed', value: 12.3, unit: 'V' }],
        words: 'injector pulse while cranking: none, feed 12.3 V present',
      },
      'crank-winding': { finding: 'off', words: 'two-wire crank sensor resistance, unplugged: open circuit' },
      'crank-type': {
        finding: 'two-wire',
        words: 'two-wire crank sensor resistance, unplugged: open circuit',
      },
      codes: { finding: 'stored', codes: ['P0335'], words: 'codes: P0335' },
    },
  },
  {
    name: 'Ostrell Lumen 2.0, 2013, 4 cylinders',
    complaint: 'cranks fast, smooth whirring, will not start; stopped while driving',
    // As written: timing belt broken, no compression in any cylinder
    cause: 'timing-broken',
    others: 'nothing',
    answers: {
      cranking: {
        finding: 'fast-even',
        readings: [{ what: 'speed', value: 340, unit: 'rpm' }],
        words: 'cranking sound and speed: faster than usual and perfectly even, 340 rev/min',
      },
      rhythm: { finding: 'flat', words: 'starter current rhythm: no humps' },
      'cam-trace': { finding: 'none', words: 'cam signal while cranking: flat line, crank signal healthy' },
      'crank-trace': {
        finding: 'regular',
        words: 'cam signal while cranking: flat line, crank signal healthy',
      },
      compression: {
        finding: 'none',
        readings: [{ what: 'highest', value: 0, unit: 'bar' }],
        words: 'compression gauge: 0 bar on cylinders 1 and 2',
      },
      'belt-look': {
        finding: 'broken',
        words: 'looking through the oil filler while someone touches the key briefly: camshaft does not turn',
      },
    },
  },
  {
    name: 'Corvane Delta 1.4, 2007, 4 cylinders',
    complaint: 'cranks, no start since yesterday, no smell of fuel',
    // As written: fuel pump gets no supply (pump relay faulty)
    cause: 'pump-relay',
    others: 'nothing',
    answers: {
      spark: { finding: 'good', words: 'spark at a tester: strong on all' },
      'starting-fluid': {
        finding: 'runs',
        words: 'short burst of starting fluid, cautions kept: runs for two seconds, dies',
      },
      'rail-pressure': {
        finding: 'none',
        readings: [{ what: 'pressure', value: 0, unit: 'kPa' }],
        words: 'rail pressure: 0 kPa',
      },
      'pump-prime': { finding: 'silent', words: 'sound of the pump at key on: silent' },
      'pump-supply': {
        finding: 'none',
        readings: [{ what: 'volts', value: 0, unit: 'V' }],
        words: 'voltage at the pump connector at key on and while cranking: 0 V',
      },
      fuses: { finding: 'good', words: 'pump fuse: whole, battery voltage on both sides' },
      'pump-relay': {
        finding: 'bad',
        words: 'pump with the relay replaced by a fused link: runs, pressure 350 kPa',
      },
      // Nothing in the data asks for: pump ground: 0.05 V drop
    },
  },
  {
    name: 'Corvane Delta 1.4, 2008, 4 cylinders',
    complaint: 'cranks, catches on starting fluid only',
    // As written: fuel pump worn out or seized
    cause: 'fuel-pump',
    others: 'nothing',
    answers: {
      spark: { finding: 'good', words: 'spark: good' },
      'starting-fluid': { finding: 'runs', words: 'starting fluid: runs shortly' },
      'rail-pressure': {
        finding: 'low',
        readings: [{ what: 'pressure', value: 40, unit: 'kPa' }],
        words: 'rail pressure: 40 kPa',
      },
      'pump-supply': {
        finding: 'good',
        readings: [{ what: 'volts', value: 11.2, unit: 'V' }],
        words: 'voltage at pump while cranking: 11.2 V',
      },
      'pump-current': {
        finding: 'worn',
        readings: [{ what: 'mean', value: 1.1, unit: 'A' }],
        words: 'pump current: 1.1 A with no ripple',
      },
      'injector-pulse': { finding: 'pulses', words: 'injector pulses: present' },
      // Nothing in the data asks for: pump ground drop: 0.08 V
    },
  },
  {
    name: 'Nordhal Vika 1.8, 2011, 4 cylinders',
    complaint: 'no start after the injector rail was cleaned; tank half full',
    // As written: injector feed missing (fuse or main relay side)
    cause: 'control-fuse',
    others: 'nothing',
    answers: {
      story: { finding: 'work', words: 'no start after the injector rail was cleaned; tank half full' },
      'fuel-level': {
        finding: 'enough',
        words: 'no start after the injector rail was cleaned; tank half full',
      },
      spark: { finding: 'good', words: 'spark: good on all' },
      'rail-pressure': {
        finding: 'good',
        readings: [{ what: 'pressure', value: 380, unit: 'kPa' }],
        words: 'rail pressure: 380 kPa',
      },
      'injector-feed': {
        finding: 'missing',
        readings: [{ what: 'feed', value: 0, unit: 'V' }],
        words: 'injector feed voltage at key on and cranking: 0 V at all four',
      },
      'injector-pulse': { words: 'injector pulse: cannot be seen, no feed' },
      fuses: { finding: 'blown', words: 'fuse of the injectors: blown' },
    },
  },
  {
    name: 'Halden Miro 1.2, 2015, 3 cylinders',
    complaint: 'cranks, no start, driver held the pedal down to start it',
    // As written: control unit in clear-flood mode because the throttle sensor reads wide open
    cause: 'throttle-sensor',
    others: 'nothing',
    answers: {
      spark: { finding: 'good', words: 'spark: good' },
      'rail-pressure': {
        finding: 'good',
        readings: [{ what: 'pressure', value: 400, unit: 'kPa' }],
        words: 'rail pressure: 400 kPa',
      },
      'injector-feed': {
        finding: 'good',
        readings: [{ what: 'feed', value: 12.2, unit: 'V' }],
        words: 'injector feed: 12.2 V',
      },
      'injector-pulse': { finding: 'none', words: 'injector pulse while cranking: none' },
      'crank-trace': { finding: 'regular', words: 'crank signal: healthy' },
      'cam-trace': { finding: 'regular', words: 'cam signal: healthy and in place against a known-good' },
      'cam-phase': { finding: 'inside', words: 'cam signal: healthy and in place against a known-good' },
      'throttle-data': {
        finding: 'wide-open',
        readings: [{ what: 'position', value: 96, unit: '%' }],
        words: 'throttle sensor reading, pedal released: 96 %',
      },
      codes: { finding: 'stored', codes: ['P0123'], words: 'codes: P0123 stored' },
    },
  },
  {
    name: 'Ostrell Lumen 2.0, 2014, 4 cylinders',
    complaint: 'started badly after belt work, now does not start, pops in the intake',
    // As written: timing belt slipped by one tooth or more (cam out of step)
    cause: 'timing-slipped',
    others: 'nothing',
    answers: {
      story: {
        finding: 'work',
        words: 'started badly after belt work, now does not start, pops in the intake',
      },
      spark: { finding: 'good', words: 'spark: present on all' },
      'rail-pressure': {
        finding: 'good',
        readings: [{ what: 'pressure', value: 390, unit: 'kPa' }],
        words: 'rail pressure: 390 kPa',
      },
      cranking: {
        finding: 'usual',
        readings: [{ what: 'speed', value: 250, unit: 'rpm' }],
        words: 'cranking rhythm: even, 250 rev/min',
      },
      compression: {
        finding: 'all-low',
        readings: [
          { what: 'highest', value: 650, unit: 'kPa' },
          { what: 'lowest', value: 620, unit: 'kPa' },
        ],
        words: 'compression gauge: 620 to 650 kPa on all, low and alike',
      },
      'cam-phase': {
        finding: 'outside',
        readings: [{ what: 'shift', value: 36, unit: 'deg' }],
        words:
          'cam edges against the crank gap, compared with the known-good: 36 crank degrees late at every edge',
      },
      codes: { finding: 'stored', codes: ['P0016'], words: 'codes: P0016' },
    },
  },
  {
    name: 'Brennik Tala 1.6, 2010, 4 cylinders',
    complaint: 'will not start after wheel bearing and gearbox work',
    // As written: crank sensor wires swapped (reversed polarity)
    cause: 'crank-wiring',
    others: 'nothing',
    answers: {
      story: { finding: 'work', words: 'will not start after wheel bearing and gearbox work' },
      spark: { finding: 'come-and-go', words: 'spark: weak and at odd moments' },
      'crank-trace': {
        finding: 'inverted',
        words:
          'crank signal: strong pick-up signal, inverted against the known-good taken with the same lead order',
      },
      'rail-pressure': {
        finding: 'good',
        readings: [{ what: 'pressure', value: 350, unit: 'kPa' }],
        words: 'rail pressure: 350 kPa',
      },
      'injector-pulse': { words: 'injector pulse: irregular, a few' },
      'cam-phase': { words: 'cam against crank: unstable edges' },
    },
  },
  {
    name: 'Tessaro Brio 1.0, 2006, 4 cylinders',
    complaint: 'cranks lazily, clicks, lights dim, no start',
    // As written: battery flat or worn
    cause: 'battery-weak',
    others: 'nothing',
    answers: {
      'battery-rest': {
        finding: 'low',
        readings: [{ what: 'rest', value: 11.6, unit: 'V' }],
        words: 'battery at rest: 11.6 V',
      },
      'supply-cranking': {
        finding: 'low',
        readings: [{ what: 'mean', value: 6.9, unit: 'V' }],
        words: 'supply while cranking: 6.9 V',
      },
      cranking: {
        finding: 'slow',
        readings: [{ what: 'speed', value: 95, unit: 'rpm' }],
        words: 'cranking speed: 95 rev/min',
      },
      'cable-drop': {
        finding: 'small',
        readings: [
          { what: 'plus', value: 0.2, unit: 'V' },
          { what: 'ground', value: 0.1, unit: 'V' },
        ],
        words: 'voltage drop battery plus to starter while cranking: 0.2 V',
      },
      'battery-test': {
        finding: 'fails',
        words: 'with a known good battery connected by proper leads: cranks at 220 rev/min and starts',
      },
      // Nothing in the data asks for: ground drop engine to battery while cranking: 0.1 V
    },
  },
  {
    name: 'Tessaro Brio 1.0, 2005, 4 cylinders',
    complaint: 'cranks slowly although the battery is new',
    // As written: high resistance in the starter's ground or supply cable
    cause: 'battery-cable',
    others: 'nothing',
    answers: {
      'battery-rest': {
        finding: 'charged',
        readings: [{ what: 'rest', value: 12.7, unit: 'V' }],
        words: 'battery at rest: 12.7 V',
      },
      'supply-cranking': {
        finding: 'holds',
        readings: [{ what: 'mean', value: 11.4, unit: 'V' }],
        words: 'supply at the battery while cranking: 11.4 V',
      },
      cranking: {
        finding: 'slow',
        readings: [{ what: 'speed', value: 110, unit: 'rpm' }],
        words: 'cranking speed: 110 rev/min',
      },
      'cable-drop': {
        finding: 'too-high',
        readings: [{ what: 'ground', value: 1.9, unit: 'V' }],
        words: 'ground drop engine to battery while cranking: 1.9 V',
      },
      'starter-current': {
        finding: 'low',
        readings: [{ what: 'mean', value: 90, unit: 'A' }],
        words: 'starter current: 90 A mean',
      },
    },
  },
  {
    name: 'Nordhal Vika 1.8, 2012, 4 cylinders',
    complaint: 'misfire on one cylinder under load, rough idle',
    // As written: one ignition coil with open secondary (or its plug lead)
    cause: 'coil',
    others: 'nothing',
    answers: {
      'which-cylinder': { finding: 'one', words: 'which cylinder: number 3' },
      'coil-primary': {
        finding: 'no-burn',
        words:
          'coil primary voltage of 3 against the others: kick flat at the clamp, no burn line, long ringing',
      },
      'injector-pulse': { finding: 'pulses', words: 'injector pulse of 3: like the others' },
      compression: {
        finding: 'good',
        readings: [
          { what: 'highest', value: 1180, unit: 'kPa' },
          { what: 'lowest', value: 1150, unit: 'kPa' },
        ],
        words: 'compression of 3: 1150 kPa, others 1180',
      },
      'coil-swap': { finding: 'follows', words: 'coil of 3 swapped with 2: the fault goes to 2' },
      codes: { finding: 'stored', codes: ['P0303'], words: 'codes: P0303' },
    },
  },
  {
    name: 'Nordhal Vika 1.8, 2012, 4 cylinders',
    complaint: 'misfire, hard start when damp',
    // As written: fouled or wrongly gapped spark plug
    cause: 'plugs',
    others: 'nothing',
    answers: {
      story: { finding: 'wet', words: 'misfire, hard start when damp' },
      'which-cylinder': { finding: 'one', words: 'which cylinder: number 1' },
      'coil-primary': {
        finding: 'long-burn',
        words: 'coil primary voltage of 1: low kick and long, low burn line',
      },
      'coil-swap': { finding: 'stays', words: 'coil swapped: the fault stays on 1' },
      'plugs-look': { finding: 'worn', words: 'plug of 1: black, wet' },
      compression: { finding: 'good', words: 'compression of 1: 1200 kPa' },
      'injector-one': { finding: 'same', words: 'injector of 1: pulse and click like the others' },
    },
  },
  {
    name: 'Corvane Delta 1.4, 2010, 4 cylinders',
    complaint: 'rough, misfires at idle, cranks with an uneven rhythm',
    // As written: one cylinder with low compression
    cause: 'weak-cylinder',
    others: 'nothing',
    answers: {
      rhythm: {
        finding: 'uneven',
        readings: [{ what: 'worst', value: -45, unit: '%' }],
        words: 'starter current humps: one of four 45 % lower',
      },
      compression: {
        finding: 'one-low',
        readings: [
          { what: 'highest', value: 1220, unit: 'kPa' },
          { what: 'lowest', value: 480, unit: 'kPa' },
        ],
        words: 'compression gauge: 1 1210, 2 1190, 3 480, 4 1220 kPa',
      },
      spark: { finding: 'good', words: 'spark on 3: good' },
      'injector-pulse': { finding: 'pulses', words: 'injector pulse of 3: good' },
    },
  },
  {
    name: 'Halden Miro 1.2, 2016, 3 cylinders',
    complaint: 'cranks, never starts, runs fine on a tow start long ago, anti-theft lamp flashes',
    // As written: immobiliser locks injection
    cause: 'immobiliser',
    others: 'nothing',
    answers: {
      spark: { finding: 'good', words: 'spark: present' },
      'rail-pressure': {
        finding: 'good',
        readings: [{ what: 'pressure', value: 400, unit: 'kPa' }],
        words: 'rail pressure: 400 kPa',
      },
      'injector-feed': {
        finding: 'good',
        readings: [{ what: 'feed', value: 12.3, unit: 'V' }],
        words: 'injector feed: 12.3 V',
      },
      'injector-pulse': { finding: 'none', words: 'injector pulse: two pulses at first then none' },
      'crank-trace': { finding: 'regular', words: 'crank signal: healthy' },
      'cam-trace': { finding: 'regular', words: 'cam signal: healthy' },
      'throttle-data': {
        finding: 'closed',
        readings: [{ what: 'position', value: 2, unit: '%' }],
        words: 'throttle sensor, released: 2 %',
      },
      'immobiliser-lamp': {
        finding: 'blocked',
        words: 'anti-theft lamp at key on: flashes fast, should go out',
      },
    },
  },
  {
    name: 'Ostrell Lumen 2.0, 2010, 4 cylinders',
    complaint: 'cranks, no spark and no injection after a repair at the engine harness',
    // As written: main relay does not feed the control unit
    cause: 'main-relay',
    others: 'nothing',
    answers: {
      story: {
        finding: 'work',
        words: 'cranks, no spark and no injection after a repair at the engine harness',
      },
      spark: { finding: 'none', words: 'spark: none' },
      'injector-feed': {
        finding: 'missing',
        readings: [{ what: 'feed', value: 0, unit: 'V' }],
        words: 'injector feed: 0 V',
      },
      'coil-feed': {
        finding: 'missing',
        readings: [{ what: 'feed', value: 0, unit: 'V' }],
        words: 'coil feed: 0 V',
      },
      codes: { finding: 'no-answer', words: 'communication with the control unit: none' },
      'control-supply': {
        finding: 'missing',
        readings: [{ what: 'supply', value: 0, unit: 'V' }],
        words: 'control unit supply behind the main relay at key on: 0 V',
      },
      'main-relay': {
        finding: 'no-output',
        words: 'main relay coil commanded: battery voltage and ground present, contact stays open',
      },
      // Nothing in the data asks for: crank signal: healthy at the sensor
    },
  },
  {
    name: 'Brennik Tala 1.6, 2008, 4 cylinders',
    complaint: 'no spark, fuel smells',
    // As written: coil pack has no feed (broken wire or fuse)
    cause: 'coil-feed',
    others: 'nothing',
    answers: {
      spark: { finding: 'none', words: 'spark: none' },
      'coil-feed': {
        finding: 'missing',
        readings: [{ what: 'feed', value: 0.3, unit: 'V' }],
        words: 'coil feed at key on and while cranking: 0.3 V',
      },
      'coil-feed-cranking': {
        finding: 'lost',
        readings: [{ what: 'feed', value: 0.3, unit: 'V' }],
        words: 'coil feed at key on and while cranking: 0.3 V',
      },
      'coil-command': {
        finding: 'pulses',
        words: 'coil command: control side pulses seen when a test lamp is fed',
      },
      'crank-trace': { finding: 'regular', words: 'crank signal: healthy' },
      'injector-pulse': { finding: 'pulses', words: 'injector pulses: present' },
      'rail-pressure': {
        finding: 'good',
        readings: [{ what: 'pressure', value: 350, unit: 'kPa' }],
        words: 'rail pressure: 350 kPa',
      },
    },
  },
  {
    name: 'Brennik Tala 1.6, 2011, 4 cylinders',
    complaint: 'no spark on any cylinder, injectors pulse',
    // As written: ignition coil (driver inside) faulty: command arrives, nothing happens
    cause: 'coil',
    others: 'nothing',
    answers: {
      spark: { finding: 'none', words: 'spark: none' },
      'coil-feed': {
        finding: 'good',
        readings: [{ what: 'feed', value: 12.3, unit: 'V' }],
        words: 'coil feed: 12.3 V',
      },
      'coil-command': {
        finding: 'pulses',
        readings: [{ what: 'dwell', value: 3.4, unit: 'ms' }],
        words: 'coil command: pulses of 3.4 ms at the connector',
      },
      'coil-current': {
        finding: 'none',
        readings: [{ what: 'peak', value: 0, unit: 'A' }],
        words: 'coil current: stays at 0 A',
      },
      'crank-trace': { finding: 'regular', words: 'crank signal: healthy' },
      // Nothing in the data asks for: coil ground: 0.04 V drop
    },
  },
  {
    name: 'Tessaro Brio 1.0, 2009, 4 cylinders',
    complaint: 'starts, runs weak, then stalls and does not restart until it has stood for a while',
    // As written: exhaust blocked (catalyst collapsed)
    cause: 'exhaust-blocked',
    others: 'nothing',
    answers: {
      spark: { finding: 'good', words: 'spark: good' },
      'rail-pressure': {
        finding: 'good',
        readings: [{ what: 'pressure', value: 360, unit: 'kPa' }],
        words: 'rail pressure: 360 kPa',
      },
      'injector-pulse': { finding: 'pulses', words: 'injector pulses: present' },
      compression: {
        finding: 'good',
        readings: [
          { what: 'highest', value: 1100, unit: 'kPa' },
          { what: 'lowest', value: 1050, unit: 'kPa' },
        ],
        words: 'compression: 1050 to 1100 kPa',
      },
      exhaust: {
        finding: 'blocked',
        readings: [{ what: 'pressure', value: 38, unit: 'kPa' }],
        words: 'exhaust back pressure: 38 kPa at 2000 rev/min',
      },
      // Nothing in the data asks for: intake vacuum while cranking and running: falls steadily at raised speed; engine with the front pipe loosened (cold): starts and runs
    },
  },
  {
    name: 'Halden Miro 1.2, 2014, 3 cylinders',
    complaint: 'cranks, tries to catch, dies at once; air box was opened',
    // As written: intake blocked (rag in the duct)
    cause: 'intake-blocked',
    others: 'nothing',
    answers: {
      story: { finding: 'work', words: 'cranks, tries to catch, dies at once; air box was opened' },
      spark: { finding: 'good', words: 'spark: good' },
      'rail-pressure': {
        finding: 'good',
        readings: [{ what: 'pressure', value: 400, unit: 'kPa' }],
        words: 'rail pressure: 400 kPa',
      },
      'injector-pulse': {
        finding: 'pulses',
        readings: [{ what: 'width', value: 12, unit: 'ms' }],
        words: 'injector pulses: present, 12 ms',
      },
      compression: {
        finding: 'good',
        readings: [
          { what: 'highest', value: 1000, unit: 'kPa' },
          { what: 'lowest', value: 1000, unit: 'kPa' },
        ],
        words: 'compression: 1000 kPa on all when throttle held open and duct removed',
      },
      'intake-look': { finding: 'blocked', words: 'air filter and duct: rag found in the duct' },
      exhaust: { finding: 'free', words: 'exhaust back pressure: normal' },
    },
  },
  {
    name: 'Nordhal Vika 1.8, 2010, 4 cylinders',
    complaint: 'stalls when warm, restarts after twenty minutes',
    // As written: crank sensor fails when hot
    cause: 'crank-sensor',
    others: 'nothing',
    answers: {
      story: { finding: 'heat', words: 'stalls when warm, restarts after twenty minutes' },
      'crank-trace': {
        finding: 'breaks',
        words: 'crank signal at the moment it does not restart (hot): breaks up, then flat',
      },
      'crank-heat': {
        finding: 'fails',
        words: 'crank signal at the moment it does not restart (hot): breaks up, then flat',
      },
      spark: { finding: 'none', words: 'spark hot: none' },
      'rail-pressure': {
        finding: 'good',
        readings: [{ what: 'pressure', value: 350, unit: 'kPa' }],
        words: 'rail pressure hot: 350 kPa',
      },
      'crank-winding': { finding: 'off', words: 'sensor resistance hot: open; cold 870 ohm' },
      'crank-type': { finding: 'two-wire', words: 'sensor resistance hot: open; cold 870 ohm' },
      codes: { finding: 'stored', codes: ['P0336'], words: 'codes: P0336' },
      // Nothing in the data asks for: crank signal cold: healthy
    },
  },
  {
    name: 'Corvane Delta 1.4, 2011, 4 cylinders',
    complaint: 'cranks long before it starts, sometimes not; worse after standing',
    // As written: rail pressure leaks back (check valve or regulator)
    cause: 'regulator',
    others: 'nothing',
    answers: {
      story: { finding: 'stood', words: 'cranks long before it starts, sometimes not; worse after standing' },
      spark: { finding: 'good', words: 'spark: good' },
      'rail-pressure': {
        finding: 'falls-off',
        readings: [
          { what: 'pressure', value: 350, unit: 'kPa' },
          { what: 'after', value: 20, unit: 'kPa' },
        ],
        words: 'rail pressure ten minutes after key off: 20 kPa',
      },
      'injector-leak': { finding: 'dry', words: 'injector leak test: dry' },
      'injector-pulse': { finding: 'pulses', words: 'injector pulses: present' },
      'pump-supply': {
        finding: 'good',
        readings: [{ what: 'volts', value: 11.4, unit: 'V' }],
        words: 'pump supply while cranking: 11.4 V',
      },
      // Nothing in the data asks for: rail pressure at key on: 350 kPa
    },
  },
  {
    name: 'Brennik Tala 1.6, 2012, 4 cylinders',
    complaint: 'misfire on cylinder 2 after the engine was washed',
    // As written: injector of cylinder 2 does not open (open winding)
    cause: 'injector-circuit',
    others: 'nothing',
    answers: {
      story: { finding: 'wet', words: 'misfire on cylinder 2 after the engine was washed' },
      'which-cylinder': { finding: 'one', words: 'misfire on cylinder 2 after the engine was washed' },
      'coil-primary': { finding: 'good', words: 'coil primary of 2: like the others, normal burn' },
      compression: { finding: 'good', words: 'compression of 2: 1180 kPa' },
      'injector-feed': {
        finding: 'good',
        readings: [{ what: 'feed', value: 12.4, unit: 'V' }],
        words: 'injector feed of 2: 12.4 V',
      },
      'injector-one': { finding: 'bad', words: 'injector resistance of 2: open; others 14.2 ohm' },
      codes: { finding: 'stored', codes: ['P0202'], words: 'codes: P0202' },
      // Nothing in the data asks for: injector signal of 2: stays at supply, no kick, control side commanded
    },
  },
  {
    name: 'Ostrell Lumen 2.0, 2012, 4 cylinders',
    complaint: 'cranks, no start; three-wire crank sensor',
    // As written: three-wire crank sensor has no supply (broken reference wire)
    cause: 'crank-wiring',
    others: 'nothing',
    answers: {
      spark: { finding: 'none', words: 'spark: none' },
      'injector-pulse': { finding: 'none', words: 'injector pulse: none' },
      'crank-trace': { finding: 'none', words: 'crank signal: stays at 0 V' },
      'crank-type': { finding: 'three-wire', words: 'cranks, no start; three-wire crank sensor' },
      'crank-supply': {
        finding: 'missing',
        readings: [{ what: 'supply', value: 0.1, unit: 'V' }],
        words: 'sensor supply at its connector, plugged in, key on: 0.1 V',
      },
      reference: {
        finding: 'good',
        readings: [{ what: 'volts', value: 5.0, unit: 'V' }],
        words: "control unit's reference voltage at another sensor: 5.0 V",
      },
      codes: { finding: 'stored', codes: ['P0335'], words: 'codes: P0335' },
      // Nothing in the data asks for: sensor ground: 0.02 V
    },
  },
  {
    name: 'Tessaro Brio 1.0, 2008, 4 cylinders',
    complaint: 'ran out of petrol last week, refilled, cranks, no start; smells different',
    // As written: wrong or stale fuel in the tank
    cause: 'wrong-fuel',
    others: 'nothing',
    answers: {
      story: {
        finding: 'refuelled',
        words: 'ran out of petrol last week, refilled, cranks, no start; smells different',
      },
      spark: { finding: 'good', words: 'spark: good' },
      'rail-pressure': {
        finding: 'good',
        readings: [{ what: 'pressure', value: 350, unit: 'kPa' }],
        words: 'rail pressure: 350 kPa',
      },
      'injector-pulse': { finding: 'pulses', words: 'injector pulses: present' },
      'injector-feed': {
        finding: 'good',
        readings: [{ what: 'feed', value: 12.4, unit: 'V' }],
        words: 'injector feed: 12.4 V',
      },
      compression: {
        finding: 'good',
        readings: [
          { what: 'highest', value: 1200, unit: 'kPa' },
          { what: 'lowest', value: 1200, unit: 'kPa' },
        ],
        words: 'compression: 1200 kPa all',
      },
      'starting-fluid': { finding: 'runs', words: 'starting fluid: runs shortly' },
      'fuel-sample': { finding: 'wrong', words: 'fuel sample: cloudy, separates in a glass' },
      'plugs-look': { finding: 'wet', words: 'plugs: wet' },
    },
  },
];
