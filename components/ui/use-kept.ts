import { useEffect, useState } from 'react';

const nameOf = (key: string) => `fallbright not kept ${key}`;

function found<T>(key: string): T | null {
  if (typeof sessionStorage === 'undefined') return null;
  try {
    const text = sessionStorage.getItem(nameOf(key));
    return text === null ? null : (JSON.parse(text) as T);
  } catch {
    return null; // a browser without storage keeps nothing, and writes all the same
  }
}

/**
 * What is being written, kept in this tab until it is sent or given up, so that
 * leaving the page and a reload lose nothing. Only for what is drawn after the
 * person is known: `key` names the person.
 * @returns what is written, its setter, whether it was found here, and how to forget it
 */
export function useKept<T>(key: string, start: () => T): [T, (value: T) => void, boolean, () => void] {
  const [before] = useState(() => found<T>(key));
  const [value, setValue] = useState<T>(() => before ?? start());
  const [written, setWritten] = useState(false);
  useEffect(() => {
    if (!written) return;
    try {
      sessionStorage.setItem(nameOf(key), JSON.stringify(value));
    } catch {
      // no room, or no storage: it still stands on the page
    }
  }, [key, value, written]);
  return [
    value,
    (next) => {
      setWritten(true);
      setValue(next);
    },
    before !== null,
    () => {
      setWritten(false);
      try {
        sessionStorage.removeItem(nameOf(key));
      } catch {
        // there was none
      }
    },
  ];
}
