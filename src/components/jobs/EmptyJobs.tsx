import { buttonClass } from '../base/Button.tsx';
import { Icon } from '../base/Icon.tsx';

const STEPS = [
  {
    title: 'Write down what it came with',
    text: 'The complaint in the customer’s words, the vehicle, the codes before anything is cleared.',
  },
  {
    title: 'Rule out, cheapest and safest first',
    text: 'Spark, fuel, compression, a free path for air. Each step is proved by a reading or a trace.',
  },
  {
    title: 'Show why',
    text: 'The cause, the proof before and after, and a report for the customer or a colleague.',
  },
];

/** The list before there is anything in it: what a job is for and how to begin. */
export function EmptyJobs() {
  return (
    <section className="max-w-160 px-(--margin) py-5">
      <div className="border-b border-line pb-4">
        <h2 className="text-title">No jobs yet</h2>
        <p className="text-head text-soft">
          A job is one vehicle’s visit: complaint, readings, captures, photos and what was found.
        </p>
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
          Before cranking: out of gear, brake on, nobody at the belts. On a hybrid the high-voltage machine
          may turn the engine: trained people only. The maker’s service information comes first.
        </span>
      </p>
      <a className={buttonClass('main', false, 'hidden desk:inline-flex')} href="/jobs/new">
        <Icon name="plus" />
        Open the first job
      </a>
    </section>
  );
}
