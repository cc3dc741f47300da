import { useEffect, useId, useRef, type ReactNode } from 'react';

interface DialogProps {
  readonly open: boolean;
  readonly title: string;
  /** Escape, the backdrop's own close and the close button come here; the caller sets `open`. */
  readonly onClose: () => void;
  readonly children: ReactNode;
}

/** A native modal dialog: the browser keeps the focus inside and gives it back to what opened it. */
export function Dialog({ open, title, onClose, children }: DialogProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const element = dialog.current;
    if (!element) return;
    if (open && !element.open) element.showModal();
    if (!open && element.open) element.close();
  }, [open]);
  return (
    <dialog
      ref={dialog}
      className="dialog"
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      onClose={() => {
        if (open) onClose();
      }}
    >
      <h2 id={titleId} className="type-panel mb-3">
        {title}
      </h2>
      {open && children}
    </dialog>
  );
}

/** Buttons at the foot of a dialog; the one that acts comes last. */
export function DialogActions({ children }: { readonly children: ReactNode }) {
  return <div className="dialog-actions">{children}</div>;
}
