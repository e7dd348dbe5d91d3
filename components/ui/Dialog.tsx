'use client';

import { useEffect, useId, useRef, type ReactNode } from 'react';
import { Button } from './Button';

/**
 * The native `<dialog>`, opened as a modal by `open`; Escape and `onClose` shut it. Focus goes to what carries `data-first`, else to
 * the first control, and returns by itself.
 */
export function Modal(props: { open: boolean; onClose: () => void; labelledBy: string; describedBy?: string; wide?: boolean; children: ReactNode }) {
  const { open, onClose } = props;
  const box = useRef<HTMLDialogElement>(null);
  useEffect(() => {
    const dialog = box.current;
    if (!dialog) return;
    if (open && !dialog.open) {
      dialog.showModal();
      // React focuses what has autoFocus before the dialog is open, where nothing can have the focus.
      dialog.querySelector<HTMLElement>('[data-first="true"]')?.focus();
    }
    if (!open && dialog.open) dialog.close();
  }, [open]);
  return (
    <dialog
      ref={box}
      className={`dialog${props.wide ? ' dialog--wide' : ''}`}
      aria-labelledby={props.labelledBy}
      aria-describedby={props.describedBy}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
    >
      {open && props.children}
    </dialog>
  );
}

/** A sheet over the page with a title and a way to shut it; `wide` is the width to read in (formula sheet, preview). */
export function Dialog({ open, onClose, title, wide, children }: { open: boolean; onClose: () => void; title: string; wide?: boolean; children: ReactNode }) {
  const heading = useId();
  return (
    <Modal open={open} onClose={onClose} labelledBy={heading} wide={wide}>
      <div className="dialog__head">
        <h2 id={heading}>{title}</h2>
        <Button look="quiet" onClick={onClose}>
          Shut
        </Button>
      </div>
      {children}
    </Modal>
  );
}
