'use client';

import { useLayoutEffect, useSyncExternalStore } from 'react';
import { NIGHT, THEME_KEY } from './theme-script';

export const THEME_CHOICES = ['day', 'night', 'clock'] as const;
/** `clock`: night from 20:00 to 07:00 by this device's clock. */
export type ThemeChoice = (typeof THEME_CHOICES)[number];
export type Theme = 'day' | 'night';

export function themeAt(choice: ThemeChoice, hour: number): Theme {
  if (choice !== 'clock') return choice;
  return hour >= NIGHT.from || hour < NIGHT.to ? 'night' : 'day';
}

const listeners = new Set<() => void>();

function readChoice(): ThemeChoice {
  try {
    const kept = localStorage.getItem(THEME_KEY);
    return THEME_CHOICES.find((choice) => choice === kept) ?? 'day';
  } catch {
    return 'day'; // storage is closed to this page
  }
}

function show(): void {
  document.documentElement.dataset.theme = themeAt(readChoice(), new Date().getHours());
  for (const listener of listeners) listener();
}

/** Kept on this device alone: the kitchen's tablet may be bright while the phone in the cellar is not. */
export function chooseTheme(choice: ThemeChoice): void {
  try {
    localStorage.setItem(THEME_KEY, choice);
  } catch {
    // Storage is closed to this page: the choice cannot be kept.
  }
  show();
}

/** The theme's script does not run where React draws the whole document itself, as after a page that fell over on the server. */
export function ShownTheme(): null {
  useLayoutEffect(show, []);
  return null;
}

let following: ReturnType<typeof setInterval> | undefined;

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  if (listeners.size === 1) {
    window.addEventListener('storage', show);
    following = setInterval(() => {
      if (readChoice() === 'clock' && document.documentElement.dataset.theme !== themeAt('clock', new Date().getHours())) show();
    }, 60_000);
  }
  return () => {
    listeners.delete(listener);
    if (listeners.size > 0) return;
    window.removeEventListener('storage', show);
    clearInterval(following);
  };
}

/** What was chosen, and what is shown now. */
export function useTheme(): { choice: ThemeChoice; theme: Theme } {
  const choice = useSyncExternalStore(subscribe, readChoice, () => 'day' as const);
  const theme = useSyncExternalStore<Theme>(subscribe, () => (document.documentElement.dataset.theme === 'night' ? 'night' : 'day'), () => 'day');
  return { choice, theme };
}
