'use client';

import { useEffect, useRef, type ReactNode } from 'react';
import { Button } from '@/components/ui/Button';
import type { PhotoBody } from '@/lib/contracts/photos';

/** One photo, as large as the window lets it be. The browser's own dialog keeps the keyboard inside and closes at Escape. */
export function PhotoLook({ photo, words, actions, onClose }: { photo: PhotoBody; words: string; actions: ReactNode; onClose: () => void }) {
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => dialog.current?.showModal(), []);
  return (
    <dialog ref={dialog} aria-label={words} onClose={onClose} className="m-auto max-h-[96dvh] max-w-[96vw] border-[1.5px] border-ink bg-sheet p-0 text-ink backdrop:bg-black/60">
      {/* Behind an address that ends: nothing to optimise. */}
      {/* eslint-disable-next-line @next/next/no-img-element -- a signed address that ends: nothing may load, shrink or keep it on the way */}
      <img src={photo.large} alt={words} width={photo.width} height={photo.height} className="block max-h-[calc(96dvh-60px)] w-auto max-w-full object-contain" />
      <div className="flex flex-wrap items-center justify-between gap-3 border-t px-3 py-2">
        <span className="type-label min-w-0 break-words text-ink2">{words}</span>
        <span className="flex gap-2">
          {actions}
          <Button onClick={() => dialog.current?.close()}>Close</Button>
        </span>
      </div>
    </dialog>
  );
}
