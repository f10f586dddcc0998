import type { LetterPayload, LinkLetter, NoticeLetter } from '@/lib/mail/letters';
import type { AlertPayload, DigestPayload, IngestPayload, MailPayload, TestPayload, TimerPayload } from '@/lib/mail/payload';
import { RULE_NAMES } from '@/lib/core/alerts/rules';
import { STATE_WORDS } from '@/lib/core/calls/attention';

/**
 * One message of every kind. What people and the watch said stands in Greek, so
 * that a word in Latin letters is one of the house's own.
 */
const AT = '2027-03-04T06:00:00.000Z';
const SINCE = '2027-03-02T23:00:00.000Z';
const cellar = { name: 'Κάβα', time_zone: 'Europe/Berlin' };

export const alertOf = (change: Partial<Omit<AlertPayload, 'alert'>> & { alert?: Partial<AlertPayload['alert']> } = {}): AlertPayload => ({
  template: 'alert',
  event: 'opened',
  at: AT,
  batch: { id: '11', name: 'Μηλίτης', tag: 5, place: 'πίσω', vessel: 'carboy' },
  cellar,
  ...change,
  alert: {
    id: '12',
    rule: 'stalled',
    level: 'check',
    kind: null,
    since: SINCE,
    headline: 'Στάση στο 1.041.',
    reason: 'Δεν πέφτει.',
    act: null,
    changes_it: null,
    evidence: [
      { name: 'πυκνότητα', value: 1.0406, threshold: 1.014, unit: 'SG' },
      { name: 'πτώση', value: -0.31, threshold: 0.5, unit: 'points/d' },
      { name: 'βαθμοί', value: 3, threshold: null, unit: 'points' },
      { name: 'ώρες', value: 31, threshold: null, unit: 'h' },
      { name: 'μέρες', value: 2.5, threshold: null, unit: 'd' },
      { name: 'αέριο', value: 2.5, threshold: null, unit: 'volumes' },
    ],
    ...change.alert,
  },
});

const EVENTS = ['opened', 'repeated', 'look_again', 'resolved'] as const;
const alerts = EVENTS.flatMap((event) => RULE_NAMES.map((rule, index) => alertOf({ event, alert: { rule, level: (['act', 'check', 'know'] as const)[index % 3]!, kind: rule === 'sensor' ? 'silent' : null } })));
const lasting = (['2027-03-04T05:50:00Z', '2027-03-04T01:50:00Z', '2027-02-20T06:00:00Z'] as const).map((since) => alertOf({ event: 'repeated', alert: { since }, batch: { id: '11', name: 'Μηλίτης', tag: null, place: null, vessel: 'carboy' } }));
const ingest = (['opened', 'repeated', 'resolved'] as const).map((event): IngestPayload => ({ template: 'ingest', event, at: AT, since: SINCE, time_zone: 'Europe/Berlin' }));

const job = { title: 'Μέτρηση', due: AT, late: false, exact: false, place: 'πίσω', taken_by: null };
const lanes = STATE_WORDS.map((state, index) => ({ id: String(index), name: 'Υδρόμελι', tag: index, state, headline: 'Πέφτει.', gravity: index % 2 ? null : 1.05 }));
const full: DigestPayload = {
  template: 'digest',
  at: AT,
  cellar,
  time_zone: 'Europe/Berlin',
  jobs: [job, { ...job, late: true, taken_by: 'Άννα' }, { ...job, exact: true, place: null }],
  more_jobs: 2,
  next_job: null,
  lanes,
  more_lanes: 3,
  muted: [{ name: 'Κρασί', until: AT, by: null }, { name: 'Μπίρα', until: AT, by: 'Άννα' }],
};
const empty: DigestPayload = { ...full, jobs: [], more_jobs: 0, lanes: [], more_lanes: 0, muted: [] };
/** Nothing was judged yet. */
const fresh: DigestPayload = { ...empty, lanes: [true, false].map((pitched) => ({ id: '21', name: 'Κρασί', tag: null, state: 'Leave be', headline: null, pitched, gravity: 1.09 })) };
const digests = [full, empty, fresh, { ...empty, next_job: { title: 'Μέτρηση.', due: AT } }, { ...full, jobs: [job], more_jobs: 0, lanes: lanes.slice(1, 2), more_lanes: 0 }];
const timer: TimerPayload = { template: 'timer', due: AT, title: 'Δεύτερη δόση', note: 'Προσοχή.', batch: { id: '11', name: 'Μηλίτης', tag: 5, place: 'πίσω' }, cellar };
const test: TestPayload = { template: 'test', at: AT, time_zone: 'Europe/Berlin' };

/** What goes out as one message: each kind alone, and the ways in which several come together. */
export const EVERY_MESSAGE: readonly (readonly MailPayload[])[] = [
  ...[...alerts, ...lasting, ...ingest, ...digests, timer, { ...timer, note: null }, test].map((payload) => [payload]),
  alerts,
  [alertOf({ alert: { level: 'act' } }), full],
  [alertOf(), ...ingest],
  ingest,
  [full, empty],
  [full, test],
  [test, test],
  [timer, timer],
  [timer, ...alerts.slice(0, 4)],
];

const KINDS: readonly LinkLetter['kind'][] = ['sign-in', 'password', 'mail-old', 'mail-new'];
const NOTICES: readonly NoticeLetter['what'][] = ['password-changed', 'second-factor-on', 'second-factor-off', 'recovery-code-used', 'mail-changed', 'account-deleted', 'removed', 'handed-over', 'webhook-given-up'];
export const EVERY_LETTER: readonly LetterPayload[] = [
  ...(['keeper', 'brewer', 'hand', 'guest'] as const).map((role): LetterPayload => ({ template: 'invitation', invitation: 'x', cellar: 'Κάβα', by: 'Άννα', role, expires_at: AT, time_zone: 'Europe/Berlin' })),
  ...KINDS.map((kind): LetterPayload => ({ template: 'link', kind, link: 'x', expires_at: AT, new_email: 'νέα@σπίτι' })),
  { template: 'link', kind: 'mail-old', link: 'x', expires_at: AT, new_email: null },
  ...NOTICES.map((what): LetterPayload => ({ template: 'notice', what, at: AT, time_zone: 'Europe/Berlin', about: 'Κάβα' })),
];
