import type { MarkJson } from '../../contract/areas/marks.ts';
import { Icon } from '../base/Icon.tsx';
import type { PlotWheel } from '../plot/types.ts';
import { whereOf } from './where-of.ts';

interface MarksListProps {
  marks: readonly MarkJson[];
  wheel: PlotWheel | null;
  chosen: string | null;
  onChoose: (mark: MarkJson) => void;
  onEdit: (mark: MarkJson) => void;
  onDelete: (mark: MarkJson) => void;
  onMake: () => void;
}

/** Marks beside the trace, in order of time. */
export function MarksList({ marks, wheel, chosen, onChoose, onEdit, onDelete, onMake }: MarksListProps) {
  return (
    <section className="marks" aria-labelledby="marks-title">
      <div className="numbers-head">
        <h2 id="marks-title">Marks</h2>
        <span className="text-soft">{marks.length}</span>
      </div>
      {marks.length === 0 && (
        <div className="marks-none">
          <p>
            <b>No marks yet</b>
          </p>
          <p className="text-soft">
            Press <kbd className="key">m</kbd> on the trace or tap Mark. Links show them.
          </p>
          <button type="button" className="button button-small" onClick={onMake}>
            <Icon name="pin" small />
            Make one
          </button>
        </div>
      )}
      <ol>
        {marks.map((mark, place) => (
          <li key={mark.id} className="mark-row" data-chosen={chosen === mark.id || undefined}>
            <button type="button" className="mark-go" onClick={() => onChoose(mark)}>
              <span className="balloon">{place + 1}</span>
              <span>
                <span className="mark-text">{mark.text || 'No text'}</span>
                <span className="mark-where">
                  {mark.author}
                  {mark.fromAnswer ? ', with an answer' : ''}, {whereOf(mark, wheel)}
                </span>
              </span>
            </button>
            <button
              type="button"
              className="button button-quiet button-icon"
              aria-label={`Change mark ${place + 1}`}
              onClick={() => onEdit(mark)}
            >
              <Icon name="more" small />
            </button>
            <button
              type="button"
              className="button button-quiet button-icon"
              aria-label={`Delete mark ${place + 1}`}
              onClick={() => onDelete(mark)}
            >
              <Icon name="bin" small />
            </button>
          </li>
        ))}
      </ol>
    </section>
  );
}
