import { Dialog } from '../base/Dialog.tsx';
import { PLOT_KEYS } from './plot-keys.ts';

/** The keys that act while the trace has focus. Loaded when asked for. */
export function KeysDialog({ onClose }: { onClose: () => void }) {
  return (
    <Dialog open title="Keys while the trace has focus" onClose={onClose}>
      <dl className="plot-keys">
        {PLOT_KEYS.map(([keys, does]) => (
          <div key={keys}>
            <dt>
              <kbd className="key">{keys}</kbd>
            </dt>
            <dd>{does}</dd>
          </div>
        ))}
      </dl>
      <form method="dialog" className="dialog-actions">
        <button type="submit" className="button">
          Close
        </button>
      </form>
    </Dialog>
  );
}
