import type { AlertPayload, MailPayload, TimerPayload } from '../mail/payload';
import { headlineOf, stateOf } from '../mail/parts';
import { said, vesselName } from '../mail/words';
import type { Texts } from '../texts/texts';

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
  /** What the button says. */
  take: string;
  /** The language of it, for reading aloud. */
  lang: string;
  urgent: boolean;
}

const ORDER = { act: 0, check: 1, know: 2 } as const;
/** Lines that a phone shows before it cuts. */
const MOST_LINES = 3;
const cut = (text: string, most: number) => (text.length > most ? `${text.slice(0, most - 1).trimEnd()}…` : text);

type Told = Omit<Notice, 'take' | 'lang'>;

function titleOf(texts: Texts, { alert, batch, event }: AlertPayload): string {
  const { t } = texts;
  const vessel = vesselName(texts, batch);
  if (event === 'resolved') return t('push.title.passed', { vessel });
  if (event === 'look_again') return t('push.title.look-again', { vessel });
  const state = stateOf(texts, alert).word;
  return t('push.title', { state: event === 'repeated' ? t('state.still', { state }) : state, vessel });
}

function about(texts: Texts, payload: AlertPayload): Told {
  const { alert, event } = payload;
  return {
    title: cut(titleOf(texts, payload), 120),
    body: cut([headlineOf(texts, payload), event === 'resolved' ? null : said(texts, alert.act ?? alert.reason)].filter(Boolean).join('. '), 400),
    url: `/alerts?alert=${encodeURIComponent(alert.id)}`,
    tag: `alert-${alert.id}`,
    alert: event === 'opened' || event === 'repeated' ? alert.id : null,
    urgent: alert.level === 'act',
  };
}

function ofTimer(texts: Texts, { title, note, batch }: TimerPayload): Told {
  return { title: cut(texts.t('timer.subject', { title }), 120), body: cut([vesselName(texts, batch), note].filter(Boolean).join('. '), 400), url: '/rounds', tag: `timer-${batch.id}`, alert: null, urgent: true };
}

function lineOf(texts: Texts, payload: AlertPayload): string {
  const named = { vessel: vesselName(texts, payload.batch), headline: headlineOf(texts, payload) };
  return cut(texts.t(payload.event === 'resolved' ? 'push.line.passed' : 'push.line', named), 110);
}

/** The first lines, and how many more there are. */
function body({ t }: Texts, lines: readonly string[]): string {
  const more = lines.length - MOST_LINES;
  return [...lines.slice(0, MOST_LINES), ...(more > 0 ? [t('list.more', { count: more })] : [])].join('\n');
}

function told(texts: Texts, payloads: readonly MailPayload[]): Told {
  const { t } = texts;
  const alerts = payloads.filter((payload) => payload.template === 'alert').toSorted((a, b) => ORDER[a.alert.level] - ORDER[b.alert.level] || Date.parse(a.at) - Date.parse(b.at));
  const timers = payloads.filter((payload) => payload.template === 'timer');
  const [clock] = timers;
  const [first] = alerts;
  if (clock && !first && timers.length === 1) return ofTimer(texts, clock);
  if (clock) {
    const lines = [...timers.map(({ title }) => cut(title, 110)), ...alerts.map((payload) => lineOf(texts, payload))];
    return { ...ofTimer(texts, clock), title: t('push.several.now', { cellar: clock.cellar.name }), body: body(texts, lines), tag: 'several' };
  }
  // The name of the house is the same in every language.
  if (!first) return { title: 'Fallbright', body: t('push.test'), url: '/settings/messages', tag: 'test', alert: null, urgent: false };
  if (alerts.length === 1) return about(texts, first);
  const lines = alerts.map((payload) => lineOf(texts, payload));
  return { title: t('push.several', { count: alerts.length, cellar: first.cellar.name }), body: body(texts, lines), url: '/alerts', tag: 'several', alert: null, urgent: first.alert.level === 'act' };
}

/** One notice for what one person is owed now. @param payloads at least one */
export const composePush = (payloads: readonly MailPayload[], texts: Texts): Notice => ({ ...told(texts, payloads), take: texts.t('alert.take'), lang: texts.lang });
