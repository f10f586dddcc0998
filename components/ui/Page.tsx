import type { ReactNode } from 'react';

/** A page's head: its name, one line of meta, and what can be done here at the right. */
export function PageHead({ title, meta, children, size = 'head' }: { title: ReactNode; meta?: ReactNode; children?: ReactNode; size?: 'head' | 'title' }) {
  return (
    <div className="flex flex-wrap items-center gap-x-5 gap-y-2 border-b-[1.5px] border-ink px-(--margin) py-3">
      <h1 className={`min-w-0 break-words ${size === 'title' ? 'type-title' : 'type-head'}`}>{title}</h1>
      {meta && <div className="type-label min-w-0 break-words text-ink2">{meta}</div>}
      {children && <div className="ml-auto flex flex-wrap items-center gap-2">{children}</div>}
    </div>
  );
}

/** The bar above a group of rows: its word and how many. */
export function GroupBar({ word, note, as: Tag = 'h2' }: { word: string; note?: ReactNode; as?: 'h2' | 'h3' | 'div' }) {
  return (
    <Tag className="type-label flex min-h-[19px] items-center gap-2.5 border-b bg-desk px-(--margin) text-ink2">
      <span className={`shrink-0 font-bold text-ink ${note ? 'max-w-[65%]' : 'max-w-full'}`}>{word}</span>
      {note}
    </Tag>
  );
}
