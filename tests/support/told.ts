import { inTransaction } from '@/db/client';
import { Membership, Person, type Batch, type Cellar } from '@/db/models';
import { ManualClock } from '@/lib/clock';
import type { Call } from '@/lib/core/types';
import type { OutgoingMail } from '@/lib/mail/transport';
import { evaluateAlerts } from '@/lib/services/alerts/evaluate';
import type { Means } from '@/lib/services/outbox/means';
import { byMail } from '@/lib/services/outbox/by-mail';
import { sendDue } from '@/lib/services/outbox/send';
import type { Actor } from '@/lib/auth/policies';
import type { Role } from '@/lib/core/roles';
import { assessmentWith, callWith } from '../unit/alerts/assessments';
import { buildBatch, buildCellar } from './factories';

const MINUTE = 60_000;
const PUBLIC_URL = 'https://barn.example';
type Calls = NonNullable<Parameters<typeof assessmentWith>[1]>['calls'];

/** A call that is so since long ago: its alert opens at the next look. */
const since = (at: number) => at - 12 * 60 * MINUTE;
export const CONDITIONS: Record<string, (at: number) => Calls> = {
  /** Wrong, to be looked at. */
  stall: (at) => ({ stalled: callWith('yes', { kind: 'stuck', since: since(at), headline: 'Stopped at 1.041.' }) }),
  cold: (at) => ({ temperature: callWith('yes', { kind: 'low', since: since(at), headline: 'Too cold.' }) }),
  /** Can hurt somebody. */
  foam: (at) => ({ neck: callWith('hold', { since: since(at), headline: 'Foam may reach the airlock.' }) }),
  /** May be done any day. */
  ready: (at) => ({ rack: callWith('yes', { since: since(at), headline: 'May be racked.' }) }),
};

export interface Told {
  cellar: Cellar;
  batch: Batch;
  clock: ManualClock;
  /** By name. */
  people: Record<string, Actor & { person: Person }>;
  mails: Array<OutgoingMail & { at: number }>;
  /** `12:05 Una: stall opened`, one line a thing that went out. */
  lines: string[];
  /** What is so of a vessel from now on; none: all is well. */
  set(conditions: readonly string[], batch?: Batch): void;
  /** Looks at every vessel and sends what is due, every `everyMin` of virtual time, until then. */
  run(untilMs: number, everyMin?: number): Promise<void>;
  send(): Promise<void>;
}

/** A cellar in virtual time, with the real tables: what is so of its vessels is told, and all that goes out is written down. */
export async function tellingCellar({ start, zone = 'UTC', people = { Una: 'keeper', Piet: 'brewer', Inga: 'hand' } }: { start: number; zone?: string; people?: Record<string, Role> }): Promise<Told> {
  const cellar = await buildCellar({ name: 'Low barn', timeZone: zone });
  const batch = await buildBatch({ cellarId: cellar.id, name: 'Oat stout', pitchedAt: new Date(start - 5 * 86_400_000) });
  const clock = new ManualClock(start);
  const made: Told['people'] = {};
  for (const [name, role] of Object.entries(people)) {
    const person = await Person.create({ name, email: `${name.toLowerCase()}-${cellar.id.slice(0, 8)}@barn.example`, timeZone: zone });
    await Membership.create({ cellarId: cellar.id, personId: person.id, role, createdAt: new Date(start - 1000) });
    made[name] = { personId: person.id, cellarId: cellar.id, role, person };
  }
  const state = new Map<string, { batch: Batch; conditions: readonly string[] }>([[batch.id, { batch, conditions: [] }]]);
  const told: Told = {
    cellar,
    batch,
    clock,
    people: made,
    mails: [],
    lines: [],
    set: (conditions, of = batch) => void state.set(of.id, { batch: of, conditions }),
    async run(until, everyMin = 5) {
      while (clock.now() < until) {
        const at = clock.now();
        for (const { batch: of, conditions } of state.values()) {
          const calls = Object.assign({}, ...conditions.map((name) => CONDITIONS[name]!(at))) as Record<string, Call>;
          await inTransaction((transaction) =>
            evaluateAlerts({ batch: of, cellar, assessment: assessmentWith(at, { calls }), context: { neck: of.neck, events: [], silenceCounts: true }, at }, transaction),
          );
        }
        clock.advance(15_000);
        await told.send();
        clock.advance(everyMin * MINUTE - 15_000);
      }
    },
    async send() {
      const note = (name: string, ready: Parameters<Means['send']>[0]) => {
        const time = new Intl.DateTimeFormat('en-GB', { timeZone: zone, hour: '2-digit', minute: '2-digit', hourCycle: 'h23' }).format(clock.now());
        const what = ready.map(({ payload }) => (payload.template === 'alert' ? `${payload.batch.name === 'Oat stout' ? '' : `${payload.batch.name} `}${payload.alert.rule} ${payload.event}` : payload.template)).join(' + ');
        told.lines.push(`${time} ${name}: ${what}`);
      };
      const listening = (means: Means['name'], device: string): Means => ({ name: means, send: async (ready) => note(`${ready[0]!.row.name}${device}`, ready), close: () => undefined });
      const mail = byMail({ transport: { send: async (letter) => void told.mails.push({ ...letter, at: clock.now() }), close: () => undefined }, publicUrl: PUBLIC_URL, messageHost: 'barn.example', now: () => clock.now() });
      const transport = { send: () => Promise.reject(new Error('not used')), close: () => undefined };
      const both: Means = { ...mail, send: (ready) => listening('mail', '').send(ready).then(() => mail.send(ready)) };
      await sendDue({ transport, means: [both, listening('push', ' (device)')], clock, publicUrl: PUBLIC_URL, messageHost: 'barn.example', leaseMs: MINUTE, random: () => 0.5 });
    },
  };
  return told;
}
