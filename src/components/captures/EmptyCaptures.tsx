import { Button } from '../base/Button.tsx';
import { Icon } from '../base/Icon.tsx';
import { WheelDrawing } from '../drawing/WheelDrawing.tsx';

const STEPS = [
  {
    title: 'What to record',
    text: 'Crank sensor while cranking, 2 s, 50 kHz or more. With the cam on a second input if you can.',
  },
  {
    title: 'How to connect',
    text: 'Back-probe with the connector in place, ground at the battery. Note the probe factor: 1:1, 10:1, 20:1.',
  },
  { title: 'How to save', text: 'All samples as CSV, not the picture. Any separator, any time unit.' },
];

/** The list before there is anything in it: what to record, how to connect, how to save, a sample to try. */
export function EmptyCaptures({ onSample }: { onSample: () => void }) {
  return (
    <section className="max-w-160 px-(--margin) py-5">
      <div className="flex items-center gap-5 border-b border-line pb-4">
        <WheelDrawing className="size-24 shrink-0" label="A trigger wheel with a gap at the top" />
        <div>
          <h2 className="text-title">No captures yet</h2>
          <p className="text-head text-soft">A capture is one recording from your scope, as a CSV file.</p>
        </div>
      </div>
      <ol>
        {STEPS.map((step, index) => (
          <li key={step.title} className="flex gap-4 border-b border-rule py-3">
            <span className="balloon" aria-hidden="true">
              {index + 1}
            </span>
            <div className="text-head">
              <h3 className="leading-6">{step.title}</h3>
              <p className="leading-6">{step.text}</p>
            </div>
          </li>
        ))}
      </ol>
      <p className="flex gap-3 py-4">
        <span className="text-watch">
          <Icon name="caution" />
        </span>
        <span>
          Out of gear, brake on, nobody at the belts. Coil primary: rated probe and attenuator. The maker’s
          service information comes first.
        </span>
      </p>
      <div className="flex items-center justify-between gap-4 border border-rule bg-sheet p-4">
        <div>
          <h3 className="text-head">Try a sample</h3>
          <p className="narrow text-soft">Simulated crank, cam, coil, injector and starter captures</p>
        </div>
        <Button onClick={onSample}>Open</Button>
      </div>
    </section>
  );
}
