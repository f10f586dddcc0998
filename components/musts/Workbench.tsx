'use client';

import { useDeferredValue, useId, useMemo, type ReactNode } from 'react';
import { reckonMust } from '@/lib/core/must/outcome';
import { bodyOf, coreSheet, type SheetDraft, type SheetErrors } from './draft';
import { Glance } from './Glance';
import { Outcome } from './Outcome';
import { SheetEditor } from './SheetEditor';
import { Tools } from './Tools';

/** The sheet at the left, what it promises at the right, live as one types. */
export function Workbench({ draft, errors, onChange, children }: { draft: SheetDraft; errors: SheetErrors; onChange: (draft: SheetDraft) => void; children: ReactNode }) {
  const promise = useId();
  const settled = useDeferredValue(draft);
  const { result, body, missing } = useMemo(() => {
    const read = bodyOf(settled);
    return { result: reckonMust(coreSheet(read.body)), body: read.body, missing: settled.lines.length - read.body.lines.length };
  }, [settled]);
  return (
    <div className="not-printed wide:grid wide:min-h-[calc(100dvh-var(--header)-56px)] wide:grid-cols-[minmax(0,1fr)_424px]">
      <Glance result={result} at={promise} />
      <div className="px-(--margin) py-4">
        <SheetEditor draft={draft} errors={errors} onChange={onChange} />
        <Tools draft={draft} onChange={onChange} />
        <div className="mt-4 flex flex-col gap-3">{children}</div>
      </div>
      <aside id={promise} aria-label="What it promises" className="scroll-mt-12 bg-desk max-wide:border-t-[1.5px] max-wide:border-ink wide:border-l">
        <div className="wide:sticky wide:top-0 wide:max-h-dvh wide:overflow-y-auto" tabIndex={-1}>
          <Outcome result={result} kind={body.kind} vesselL={body.vessel_l} missing={missing} />
        </div>
      </aside>
    </div>
  );
}
