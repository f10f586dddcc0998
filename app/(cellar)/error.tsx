'use client';

import { ErrorState } from '@/components/ui/Notice';

/** A page that fell over: the head and the way to the other pages stay. */
export default function CellarError() {
  return (
    <ErrorState title="This page could not be drawn" onRetry={() => location.reload()}>
      What was logged is safe. Try again; if it stays, go back to the shelf and tell whoever keeps the cellar.
    </ErrorState>
  );
}
