'use client';

import { useEffect, useRef, useState } from 'react';
import type { LaneView } from './lanes';

const SPOKEN = new Set(['Stop', 'Now', 'Check']);

/** Speaks a lane that has newly come to Stop, Now or Check, and nothing else. */
export function Herald({ views }: { views: readonly LaneView[] }) {
  const before = useRef<Map<string, string> | null>(null);
  const [words, setWords] = useState('');
  useEffect(() => {
    const known = before.current;
    before.current = new Map(views.map((view) => [view.lane.id, view.attention.state]));
    if (known === null) return;
    const fresh = views.filter((view) => SPOKEN.has(view.attention.state) && known.get(view.lane.id) !== view.attention.state);
    if (fresh.length > 0) setWords(fresh.map((view) => `${view.attention.state}: ${view.lane.name}. ${view.headline}.`).join(' '));
  }, [views]);
  return (
    <p role="status" aria-live="polite" className="heard-only">
      {words}
    </p>
  );
}
