import { z } from 'zod';
import { ROLES } from '../core/roles';
import { id } from './common';

export { ROLES, type Role } from '../core/roles';

export const signInForm = z.object({
  email: z.string().trim().toLowerCase().max(254, 'is too long').pipe(z.email('is not a mail address')),
  password: z.string().min(1, 'must not be empty').max(256, 'is too long'),
});
export type SignInForm = z.infer<typeof signInForm>;

/** `GET /api/v1/me`: who asks, and in which cellar. */
export const meSchema = z.object({
  person: z.object({ id, name: z.string(), email: z.string(), time_zone: z.string() }),
  cellar: z.object({ id, name: z.string(), time_zone: z.string(), role: z.enum(ROLES) }),
  cellars: z.array(z.object({ id, name: z.string(), role: z.enum(ROLES) })),
  /** What the person may do here, for showing or hiding a button; the server decides again. */
  may: z.array(z.string()),
});
export type MeBody = z.infer<typeof meSchema>;

/** An open sign-in of the person, to be ended from afar. */
export const signInSchema = z.object({ id, created_at: z.string(), last_seen_at: z.string(), user_agent: z.string(), current: z.boolean() });
export const signInList = z.object({ items: z.array(signInSchema) });

export const memberSchema = z.object({ person: z.object({ id, name: z.string(), email: z.string() }), role: z.enum(ROLES), since: z.string() });
export const memberList = z.object({ items: z.array(memberSchema) });

/** `POST /api/v1/cellars/active`: which of the person's cellars the browser shows. */
export const chooseCellar = z.object({ cellar_id: id });
