import type { Circuit } from '../../engine/circuit.ts';

type Choice = readonly [key: string, text: string, hint: string];

const NOTHING: Choice = ['nothing-wrong', 'Nothing wrong here', 'look elsewhere'];
const TOOTH: Choice = ['bent-or-chipped-tooth', 'Bent or chipped tooth', 'or dirt in one tooth space'];
const GAP: Choice = ['wide-air-gap', 'Wide air gap at the sensor', 'or a weak sensor'];
const TURNED: Choice = ['leads-turned-over', 'Leads turned over', 'polarity inverted'];
const WIRING: Choice = ['wiring-opens', 'Wiring that opens now and then', 'chafed, loose pin'];
const CAM: Choice = ['cam-out-of-step', 'Cam out of step with the crank', 'belt or chain moved'];
const SECONDARY: Choice = ['open-secondary', 'Open secondary circuit', 'the plug’s gap does not break down'];
const SHORTED: Choice = ['shorted-turns', 'Shorted turns in the coil', 'current rises too fast'];
const DRIVER: Choice = ['weak-driver', 'Weak driver', 'does not pull down fully'];
const SUPPLY: Choice = ['low-supply', 'Low supply while cranking', 'battery or cables'];
const ONE_WEAK: Choice = ['one-weak-cylinder', 'One weak cylinder', 'low compression in one'];
const NO_COMPRESSION: Choice = ['no-compression', 'No compression in any cylinder', 'belt or chain broken'];

const CRANK_CAUSES = [NOTHING, TOOTH, GAP, TURNED, WIRING, CAM];
const COIL_CAUSES = [NOTHING, SECONDARY, SHORTED, DRIVER, SUPPLY];
const STARTER_CAUSES = [NOTHING, ONE_WEAK, NO_COMPRESSION, SUPPLY];

/** An exercise of the demo workshop: numbers and places are taken from what the engine measured, never typed here. */
export interface DemoExercise {
  readonly file: string;
  readonly title: string;
  readonly question: string;
  readonly complaint?: string;
  /** Points at the evidence. */
  readonly stretch?: true;
  readonly circuit?: { readonly signal: number; readonly answer: Circuit };
  readonly cause?: { readonly answer: Choice; readonly choices: readonly Choice[] };
  /** A measured value, to be read off within a share of it. */
  readonly value?: {
    readonly key: string;
    readonly label: string;
    readonly unit: string;
    readonly share: number;
  };
  readonly text?: string;
  /** Key whose evidence shows the answer, and what it is called. */
  readonly evidence?: { readonly key: string; readonly label: string };
  readonly sentence: string;
  readonly reasoning: readonly (readonly [title: string, text: string])[];
  readonly caution?: string;
}

const HIGH_VOLTAGE =
  'Primary side: an input rated for 400 V or an attenuator, scope ground at battery negative. Never touch or hold leads while cranking.';

const crank: readonly DemoExercise[] = [
  {
    file: 'crank-60-2-with-cam.csv',
    title: 'Two traces of one engine',
    question: 'Both traces were taken at the same time while cranking. Which circuit is the upper one?',
    circuit: { signal: 0, answer: 'crank-vr' },
    evidence: { key: 'gap_ratio', label: 'the gap' },
    sentence:
      'A two-wire crank sensor: one swing a tooth through zero, and a flat stretch where teeth are missing.',
    reasoning: [
      [
        'Swing or levels?',
        'It swings through zero both ways: the sensor makes its own voltage, so it has two wires.',
      ],
      [
        'What repeats?',
        'Many equal swings, then a flat stretch, once a turn. Missing teeth leave that flat.',
      ],
      [
        'What does the other say?',
        'The lower trace has few long levels in two turns: a cam sensor with three wires.',
      ],
    ],
  },
  {
    file: 'crank-60-2-weak-tooth.csv',
    title: 'What is wrong, and where?',
    question:
      'Sparks come and go while cranking. Lay a stretch on the place that shows the trouble, then choose its cause.',
    complaint: 'Cranks, starts now and then',
    stretch: true,
    cause: { answer: TOOTH, choices: CRANK_CAUSES },
    evidence: { key: 'irregular_teeth', label: 'the short tooth' },
    sentence: 'One short tooth, at the same place in every turn: bent, chipped or dirty.',
    reasoning: [
      [
        'One tooth or all?',
        'The others keep their height. A wide air gap or a weak sensor lowers every tooth.',
      ],
      [
        'Fixed or wandering?',
        'It stands at one angle in every turn. What keeps its angle sits on the wheel; wiring wanders.',
      ],
      [
        'Is the gap right?',
        'The flat stretch is where two teeth are left out on purpose, and it is not the trouble.',
      ],
    ],
    caution: 'Engine off, key out. Turn the engine by hand only, and look through the sensor hole.',
  },
  {
    file: 'crank-36-1-reversed.csv',
    title: 'After somebody worked on it',
    question:
      'The engine cranks and does not start since the sensor’s plug was repaired. Which cause fits the trace?',
    complaint: 'No start since the plug was repaired',
    cause: { answer: TURNED, choices: CRANK_CAUSES },
    evidence: { key: 'polarity', label: 'swing after the gap' },
    sentence: 'The leads are turned over: the swing beside the gap goes the wrong way first.',
    reasoning: [
      [
        'Which way first?',
        'With normal polarity the voltage rises as a tooth arrives. After this gap it falls first.',
      ],
      [
        'Are the teeth sound?',
        'All swings are alike in height and spacing: wheel and air gap are not the trouble.',
      ],
      [
        'Sensor or probe?',
        'Swapped probe leads look the same. Turn the probe first, before the plug is opened again.',
      ],
    ],
    caution: 'Key off before the plug is opened. Check the maker’s diagram for which pin is which.',
  },
  {
    file: 'crank-60-2-cam-late.csv',
    title: 'Crank against cam',
    question:
      'The crank’s sprocket has 20 teeth. Compare where the cam changes level after the gap with a sound engine’s. Which cause fits?',
    complaint: 'No start after the belt was changed',
    cause: { answer: CAM, choices: CRANK_CAUSES },
    sentence: 'The cam comes one belt tooth late: 18 crank degrees with 20 teeth on the crank’s sprocket.',
    reasoning: [
      ['Are both signals sound?', 'Every tooth is there and alike, and the cam reaches both levels.'],
      [
        'Where do the edges lie?',
        'All of them come later after the gap by the same angle. A fixed shift is mechanical.',
      ],
      [
        'How much?',
        'One tooth is 360 / 20 = 18 degrees. Compare with a known-good of the same engine and condition.',
      ],
    ],
    caution: 'No cranking when belt slip is suspected: valves may meet pistons. Check the marks by hand.',
  },
  {
    file: 'crank-36-2-three-wire.csv',
    title: 'How fast does it crank?',
    question:
      'The wheel has 36 places with two teeth missing. Read off one turn, and say the cranking speed.',
    value: { key: 'rpm_mean', label: 'Cranking speed', unit: 'rpm', share: 0.05 },
    evidence: { key: 'rpm_mean', label: 'complete turns' },
    sentence: 'From gap to gap is one turn: 60 divided by its seconds is the speed in turns a minute.',
    reasoning: [
      ['What is one turn?', 'The long level comes once a turn. Lay the span from one to the next.'],
      ['From time to speed', '60 s divided by the time of a turn gives rev/min.'],
      [
        'Is it usual?',
        'Compare with the same engine, warm or cold. Slow cranking points at battery, cables, starter or drag.',
      ],
    ],
  },
];

const coils: readonly DemoExercise[] = [
  {
    file: 'coil-primary-burn.csv',
    title: 'What was the probe on?',
    question: 'Name the circuit.',
    circuit: { signal: 0, answer: 'coil-primary-voltage' },
    evidence: { key: 'kick_peak', label: 'the kick' },
    sentence:
      'The switched side of a coil: pulled low, then a narrow kick far above the feed, a burn line and a ring.',
    reasoning: [
      ['What pulls it low?', 'The driver, for a few milliseconds: that is the dwell.'],
      [
        'What makes the kick?',
        'The field collapses when the driver opens. An injector kicks too, but has no burn line after it.',
      ],
    ],
    caution: HIGH_VOLTAGE,
  },
  {
    file: 'coil-primary-burn.csv',
    title: 'How long is the dwell?',
    question: 'Measure the dwell of any firing: from the driver closing to its opening.',
    value: { key: 'dwell', label: 'Dwell', unit: 'ms', share: 0.05 },
    evidence: { key: 'dwell', label: 'dwell' },
    sentence: 'From the fall to near zero to the rise of the kick.',
    reasoning: [
      ['Where does it begin?', 'Where the feed falls to near zero: the driver closes.'],
      [
        'Where does it end?',
        'At the kick: the driver opens. The burn line comes after and is not part of it.',
      ],
    ],
    caution: HIGH_VOLTAGE,
  },
  {
    file: 'coil-primary-no-burn.csv',
    title: 'Sparks, or none?',
    question: 'This cylinder does not fire. Which cause fits, and what would you check next?',
    complaint: 'One cylinder dead',
    cause: { answer: SECONDARY, choices: COIL_CAUSES },
    text: 'What would you check next, and how do you keep it safe?',
    evidence: { key: 'kick_peak', label: 'the kick at the driver’s clamp' },
    sentence:
      'The gap does not break down: the kick stops flat at the driver’s clamp, and there is no burn line.',
    reasoning: [
      ['Does the primary work?', 'Dwell and kick are there: feed, driver and primary winding work.'],
      ['Where does the energy go?', 'No burn line, then long ringing: it could not leave as a spark.'],
      [
        'What stops it?',
        'A secondary winding, lead, cap or plug that is open, or a gap too wide for the coil.',
      ],
    ],
    caution:
      'Use a spark tester on a grounded path, away from fuel vapour. Never run a coil with its secondary open.',
  },
  {
    file: 'coil-primary-amperes.csv',
    title: 'How much current?',
    question: 'How far does the coil’s current rise before the driver opens?',
    value: { key: 'peak_current', label: 'Highest current', unit: 'A', share: 0.06 },
    evidence: { key: 'peak_current', label: 'the highest current' },
    sentence: 'The top of the ramp, just before it falls within microseconds.',
    reasoning: [
      ['What shape is it?', 'A curve that rises ever more slowly: inductance first, resistance later.'],
      [
        'What would a fault look like?',
        'A step at the start: shorted turns. A low, early flat: high resistance.',
      ],
    ],
  },
];

const rest: readonly DemoExercise[] = [
  {
    file: 'injector-pulses.csv',
    title: 'Which circuit is this?',
    question: 'Name the circuit.',
    circuit: { signal: 0, answer: 'injector-voltage' },
    evidence: { key: 'hump_time', label: 'the needle’s hump' },
    sentence:
      'An injector: pulled low for a pulse, a spike at switch-off, and a small hump as the needle seats.',
    reasoning: [
      ['How long is it low?', 'Some milliseconds, longer than a dwell, and no burn line follows.'],
      [
        'What is the hump?',
        'The needle moves as it closes. Without it, ask whether the needle moves at all.',
      ],
    ],
  },
  {
    file: 'injector-pulses.csv',
    title: 'How long is the pulse?',
    question: 'Measure the width of one pulse.',
    value: { key: 'pulse_width', label: 'Pulse width', unit: 'ms', share: 0.05 },
    evidence: { key: 'pulse_width', label: 'pulse' },
    sentence: 'From the fall to the spike.',
    reasoning: [
      ['Where does it end?', 'At the spike: the control unit opens. The hump after it is the needle.'],
    ],
  },
  {
    file: 'starter-weak-cylinder.csv',
    title: 'The rhythm of cranking',
    question: 'This is one signal while cranking a four-cylinder engine. Which cause fits?',
    complaint: 'Starts badly, runs rough',
    cause: { answer: ONE_WEAK, choices: STARTER_CAUSES },
    sentence: 'One weak cylinder: every fourth hump of the starter’s current is lower.',
    reasoning: [
      ['What is a hump?', 'The starter works harder for each compression: one hump a cylinder.'],
      [
        'Equal or not?',
        'Three are alike, the fourth is lower each time. Without compression all would be low and even.',
      ],
      ['What proves it?', 'A gauge. The trace says that one is weak, not which, nor why.'],
    ],
    caution:
      'For a compression test: ignition and injection disabled, throttle open, clear of belts and fans.',
  },
];

export interface DemoSet {
  readonly title: string;
  readonly intro: string;
  readonly exercises: readonly DemoExercise[];
  /** Said once all of them are answered. */
  readonly after: string;
  /** A capture that opens then, by its sample. */
  readonly atTheEnd: { readonly file: string; readonly caption: string };
}

const SIMULATED = 'All traces in it are simulated: no vehicle was recorded.';

/** Three sets, a dozen exercises. */
export const DEMO_SETS: readonly DemoSet[] = [
  {
    title: 'First steps while cranking',
    intro: `Crank and cam: what a sound trace looks like, and four that are not. ${SIMULATED}`,
    exercises: crank,
    after:
      'Everything was measured from the gap. Whatever keeps its angle from it is on the engine; whatever wanders is in the wiring.',
    atTheEnd: { file: 'crank-60-2-with-cam.csv', caption: 'A sound pair, to look at beside the others.' },
  },
  {
    title: 'Coils: dwell, kick, burn',
    intro: `The switched side of a coil, read from left to right. ${SIMULATED}`,
    exercises: coils,
    after: 'Dwell fills the coil, the kick looks for a way out, the burn line says that it found one.',
    atTheEnd: { file: 'coil-primary-burn.csv', caption: 'Three firings with a burn line.' },
  },
  {
    title: 'Injector and starter',
    intro: `Fuel and compression without a gauge: what the trace tells, and what it cannot. ${SIMULATED}`,
    exercises: rest,
    after: 'A trace narrows the search. A gauge, a meter or a look proves it.',
    atTheEnd: { file: 'starter-weak-cylinder.csv', caption: 'Every fourth hump is lower.' },
  },
];
