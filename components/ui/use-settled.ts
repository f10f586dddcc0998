'use client';

import { useEffect, useState } from 'react';

/** A pinch asks for its readings once it rests. */
const SETTLE_MS = 250;

/** The value once it has stood still for a moment. */
export function useSettled<T>(value: T): T {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), SETTLE_MS);
    return () => clearTimeout(timer);
  }, [value]);
  return settled;
}
