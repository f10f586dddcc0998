'use client';

import { useEffect, useId, useRef, type ReactNode } from 'react';
import { Button } from './Button';

/** A form over the page: at the right of a wide one, from below on a phone. The browser keeps the focus inside; Escape closes. */
export function Sheet({ title, onClose, children }: { title: string; onClose: () => void; children: ReactNode }) {
  const dialog = useRef<HTMLDialogElement>(null);
  const heading = useId();

  useEffect(() => {
    const element = dialog.current;
    if (!element) return;
    const before = document.activeElement;
    element.showModal();
    return () => {
      element.close();
      if (before instanceof HTMLElement) before.focus();
    };
  }, []);

  return (
    <dialog
      ref={dialog}
      aria-labelledby={heading}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      className="sheet m-0 ml-auto h-dvh max-h-none w-full max-w-[440px] border-l-[1.5px] border-ink bg-sheet p-0 text-ink backdrop:bg-ink/35 max-strip:mt-auto max-strip:h-auto max-strip:max-h-[92dvh] max-strip:max-w-none max-strip:border-l-0 max-strip:border-t-[1.5px]"
    >
      <div className="flex min-h-full flex-col">
        <header className="flex items-center justify-between gap-4 border-b-[1.5px] border-ink px-(--margin) py-3">
          <h2 id={heading} className="type-sub">
            {title}
          </h2>
          <Button look="quiet" onClick={onClose}>
            Close
          </Button>
        </header>
        <div className="flex-1 px-(--margin) py-4">{children}</div>
      </div>
    </dialog>
  );
}
