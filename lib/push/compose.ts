import type { AlertPayload, MailPayload, TimerPayload } from '../mail/payload';
import { stateOf } from '../mail/parts';
import { bare, vesselName } from '../mail/words';

/** What the service worker shows; it knows nothing but this. */
export interface Notice {
  title: string;
  body: string;
  /** Where a tap leads, below the house's own address. */
  url: string;
  /** A newer notice of the same tag takes the older one's place. */
  tag: string;
  /** The alert that its button takes in hand; null: no button. */
  alert: string | null;
  urgent: boolean;
}

const ORDER = { act: 0, check: 1, know: 2 } as const;
/** Lines that a phone shows before it cuts. */
const MOST_LINES = 3;
const cut = (text: string, most: number) => (text.length > most ? `${text.slice(0, most - 1).trimEnd()}…` : text);

function about({ alert, batch, event }: AlertPayload): Notice {
  const state = event === 'resolved' ? 'Passed' : event === 'look_again' ? 'Look again' : `${stateOf(alert).word}${event === 'repeated' ? ', still' : ''}`;
  return {
    title: cut(`${state}: ${vesselName(batch)}`, 120),
    body: cut([bare(alert.headline), event === 'resolved' ? null : (alert.act ?? alert.reason)].filter(Boolean).join('. '), 400),
    url: `/alerts?alert=${encodeURIComponent(alert.id)}`,
    tag: `alert-${alert.id}`,
    alert: event === 'opened' || event === 'repeated' ? alert.id : null,
    urgent: alert.level === 'act',
  };
}

function ofTimer({ title, note, batch }: TimerPayload): Notice {
  return { title: cut(`Now: ${title}`, 120), body: cut([vesselName(batch), note].filter(Boolean).join('. '), 400), url: '/rounds', tag: `timer-${batch.id}`, alert: null, urgent: true };
}

/** One notice for what one person is owed now. @param payloads at least one */
export function composePush(payloads: readonly MailPayload[]): Notice {
  const alerts = payloads.filter((payload) => payload.template === 'alert').toSorted((a, b) => ORDER[a.alert.level] - ORDER[b.alert.level] || Date.parse(a.at) - Date.parse(b.at));
  const timers = payloads.filter((payload) => payload.template === 'timer');
  const [clock] = timers;
  if (clock && alerts.length === 0 && timers.length === 1) return ofTimer(clock);
  const [first] = alerts;
  if (clock) {
    const lines = [...timers.map(({ title }) => cut(title, 110)), ...alerts.map(({ alert, batch }) => cut(`${vesselName(batch)}: ${bare(alert.headline)}`, 110))];
    const more = lines.length - MOST_LINES;
    return { ...ofTimer(clock), title: `Now, from ${clock.cellar.name}`, body: [...lines.slice(0, MOST_LINES), ...(more > 0 ? [`and ${more} more`] : [])].join('\n'), tag: 'several' };
  }
  if (!first) return { title: 'Fallbright', body: 'Messages of the watch arrive on this device.', url: '/settings/messages', tag: 'test', alert: null, urgent: false };
  if (alerts.length === 1) return about(first);
  const lines = alerts.slice(0, MOST_LINES).map(({ alert, batch, event }) => cut(`${vesselName(batch)}: ${event === 'resolved' ? 'passed, ' : ''}${bare(alert.headline)}`, 110));
  if (alerts.length > MOST_LINES) lines.push(`and ${alerts.length - MOST_LINES} more`);
  return { title: `${alerts.length} messages from ${first.cellar.name}`, body: lines.join('\n'), url: '/alerts', tag: 'several', alert: null, urgent: first.alert.level === 'act' };
}
