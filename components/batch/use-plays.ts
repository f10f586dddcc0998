'use client';

import { useDeferredValue, useMemo, useState } from 'react';
import type { Laid } from '@/components/charts/picture';
import type { BatchBody } from '@/lib/contracts/batches';
import { layBeside, type OtherCurve } from '@/lib/core/fit/other';
import type { Footing } from '@/lib/core/types';
import { curveLaid, curveWords } from './other-curve';
import { NOTHING_ELSE, play, type Played, type WhatIfDraft } from './what-if';

export type PlayKind = 'what-if' | 'curve';

export interface Plays {
  open: PlayKind | null;
  toggle: (kind: PlayKind) => void;
  close: () => void;
  draft: WhatIfDraft;
  setDraft: (draft: WhatIfDraft) => void;
  played: Played;
  curve: OtherCurve;
  setCurve: (curve: OtherCurve) => void;
  curveWords: string;
  /** What is laid over the chart. */
  laid: readonly Laid[];
}

const NOTHING_PLAYED: Played = { errors: {}, rows: [], cautions: [], laid: null };

/** What somebody plays with under the chart: it lives in the page alone and is gone with it. `now` in seconds since 1970. */
export function usePlays(batch: BatchBody, footing: Footing | null, now: number, timeZone: string): Plays {
  const [open, setOpen] = useState<PlayKind | null>(null);
  const [draft, setDraft] = useState<WhatIfDraft>(NOTHING_ELSE);
  const [curve, setCurve] = useState<OtherCurve>('logistic');
  // The field shows each stroke at once; the curve follows.
  const settled = useDeferredValue(draft);
  const close = () => {
    setOpen(null);
    setDraft(NOTHING_ELSE);
  };
  const played = useMemo(() => (open === 'what-if' && footing ? play(settled, batch, footing, now, timeZone) : NOTHING_PLAYED), [open, footing, settled, batch, now, timeZone]);
  const beside = useMemo(() => (open === 'curve' && footing ? layBeside(footing, curve) : null), [open, footing, curve]);
  const laid = useMemo(() => {
    if (played.laid) return [played.laid];
    const until = now + Math.max(3 * 86_400, (footing?.hoursToEnd ?? 0) * 3600 * 1.15);
    const other = beside && footing ? curveLaid(curve, beside, footing, until) : null;
    return other ? [other] : [];
  }, [played, beside, footing, curve, now]);
  return {
    open,
    toggle: (kind) => (open === kind ? close() : setOpen(kind)),
    close,
    draft,
    setDraft,
    played,
    curve,
    setCurve,
    curveWords: beside ? curveWords(curve, beside) : '',
    laid,
  };
}
