import type { ReactNode } from 'react';

/** A name and what stands beside it; below it on a phone. */
export function Row({ name, children }: { name: ReactNode; children: ReactNode }) {
  return (
    <div className="grid items-baseline gap-x-5 border-b border-rule px-(--margin) py-2 strip:grid-cols-[9rem_minmax(0,1fr)]">
      <span className="type-label text-ink2">{name}</span>
      <div className="type-body min-w-0 break-words">{children}</div>
    </div>
  );
}
