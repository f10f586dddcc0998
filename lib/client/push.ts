'use client';

import { useCallback, useEffect, useState } from 'react';
import { sendJson } from './fetcher';
import { isPath, refresh } from './use-resource';

/** Where this browser stands with push messages. */
export type PushState = 'unknown' | 'unsupported' | 'blocked' | 'off' | 'on';

const supported = () => 'serviceWorker' in navigator && 'PushManager' in window && 'Notification' in window;

async function subscription(): Promise<PushSubscription | null> {
  const registration = await navigator.serviceWorker.getRegistration();
  return (await registration?.pushManager.getSubscription()) ?? null;
}

async function standing(): Promise<PushState> {
  if (!supported()) return 'unsupported';
  if (Notification.permission === 'denied') return 'blocked';
  return (await subscription()) ? 'on' : 'off';
}

const bytesOf = (base64url: string) => Uint8Array.from(atob(base64url.replaceAll('-', '+').replaceAll('_', '/')), (sign) => sign.charCodeAt(0));

async function register(held: PushSubscription): Promise<void> {
  const { endpoint, keys } = held.toJSON();
  await sendJson('POST', '/devices', { endpoint, keys: { p256dh: keys?.p256dh, auth: keys?.auth } });
}

/** Whether messages come to this browser, and how to begin and end it. Asked for only after a tap: a page that asks by itself is refused. */
export function usePush(pushKey: string | undefined): { state: PushState; turnOn(): Promise<void>; turnOff(): Promise<void> } {
  const [state, setState] = useState<PushState>('unknown');

  const look = useCallback(() => standing().then(setState, () => setState('unsupported')), []);
  useEffect(() => void look(), [look]);

  const turnOn = useCallback(async () => {
    if (!pushKey) return;
    if ((await Notification.requestPermission()) !== 'granted') return look();
    const registration = await navigator.serviceWorker.ready;
    const held = (await registration.pushManager.getSubscription()) ?? (await registration.pushManager.subscribe({ userVisibleOnly: true, applicationServerKey: bytesOf(pushKey) }));
    try {
      await register(held);
    } catch (error) {
      // Half on would look on and tell nothing.
      await held.unsubscribe();
      throw error;
    } finally {
      await look();
    }
    await refresh(isPath('/messages'));
  }, [pushKey, look]);

  const turnOff = useCallback(async () => {
    await (await subscription())?.unsubscribe();
    await look();
    await refresh(isPath('/messages'));
  }, [look]);

  return { state, turnOn, turnOff };
}

/** A browser that takes messages tells the house so again after each signing in: the address goes with the sign-in. */
export async function renewDevice(): Promise<void> {
  if (!supported() || Notification.permission !== 'granted') return;
  const held = await subscription();
  if (held) await register(held);
}

/** The next person at this browser must not be told what the last one was. */
export async function dropDevice(): Promise<void> {
  if (supported()) await (await subscription())?.unsubscribe();
}

export async function removeDevice(id: string): Promise<void> {
  await sendJson('DELETE', `/devices/${id}`);
  await refresh(isPath('/messages'));
}
