import { type ReactNode, useEffect, useId, useRef } from 'react';

interface DialogProps {
  open: boolean;
  title: string;
  onClose: () => void;
  children: ReactNode;
  /** Buttons, the main one last. */
  actions?: ReactNode;
}

/** The browser's own modal dialog: focus stays inside, Escape closes, focus returns. */
export function Dialog({ open, title, onClose, children, actions }: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (dialog === null) return;
    if (open && !dialog.open) dialog.showModal();
    if (!open && dialog.open) dialog.close();
  }, [open]);
  return (
    <dialog ref={ref} className="dialog" aria-labelledby={titleId} onClose={onClose}>
      {open && (
        <>
          <h2 id={titleId} className="dialog-title">
            {title}
          </h2>
          {children}
          {actions !== undefined && <div className="dialog-actions">{actions}</div>}
        </>
      )}
    </dialog>
  );
}
