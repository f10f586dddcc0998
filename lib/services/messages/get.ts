import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { MessagesBody } from '@/lib/contracts/messages';
import { presentMessages } from './present';

/** Rules, the person's own choices, their devices, turns and mutes. */
export async function getMessages(actor: Actor, signInId: string | null, { clock = systemClock }: { clock?: Clock } = {}): Promise<MessagesBody> {
  authorize(actor, 'alerts.read');
  return presentMessages(actor, signInId, new Date(clock.now()));
}
