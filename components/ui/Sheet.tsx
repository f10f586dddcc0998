'use client';

import { useEffect, useId, useRef, useState, type ReactNode } from 'react';
import { Button } from './Button';

/** A form over the page: at the right of a wide one, from below on a phone. The browser keeps the focus inside; Escape closes, and asks first where something was typed. */
export function Sheet({ title, onClose, children }: { title: string; onClose: () => void; children: ReactNode }) {
  const dialog = useRef<HTMLDialogElement>(null);
  const heading = useId();
  const typed = useRef(false);
  const [asked, setAsked] = useState(false);

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

  const leave = () => {
    if (!typed.current || asked) return onClose();
    setAsked(true);
    dialog.current?.scrollTo({ top: 0 });
  };

  return (
    <dialog
      ref={dialog}
      aria-labelledby={heading}
      onInput={() => (typed.current = true)}
      onCancel={(event) => {
        // A file that was not chosen cancels too, and comes by here.
        if (event.target !== dialog.current) return;
        event.preventDefault();
        leave();
      }}
      // A second Escape in a row closes a dialog without asking the page.
      onClose={() => {
        if (dialog.current && !dialog.current.open) onClose();
      }}
      className="sheet m-0 ml-auto h-dvh max-h-none w-full max-w-[440px] border-l-[1.5px] border-ink bg-sheet p-0 text-ink backdrop:bg-ink/35 max-strip:mt-auto max-strip:h-auto max-strip:max-h-[92dvh] max-strip:max-w-none max-strip:border-l-0 max-strip:border-t-[1.5px]"
    >
      <div className="flex min-h-full flex-col">
        <header className="flex items-center justify-between gap-4 border-b-[1.5px] border-ink px-(--margin) py-3">
          <h2 id={heading} className="type-sub">
            {title}
          </h2>
          <Button look="quiet" onClick={leave}>
            Close
          </Button>
        </header>
        {asked && (
          <div role="alert" className="flex flex-wrap items-center gap-2 border-b-[1.5px] border-ink bg-desk px-(--margin) py-3">
            <p className="type-body w-full">What you wrote here is not kept yet.</p>
            <Button look="first" autoFocus onClick={() => setAsked(false)}>
              Go on writing
            </Button>
            <Button look="final" onClick={onClose}>
              Throw it away
            </Button>
          </div>
        )}
        <div className="flex-1 px-(--margin) py-4">{children}</div>
      </div>
    </dialog>
  );
}
