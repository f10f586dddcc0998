import type { Change } from '../contracts/events';
import { isOfBatch } from './batches';
import { isPath, refresh } from './use-resource';

/** `offline` since when the line has been down, in ms since 1970; null while it is up. */
export interface LiveState {
  state: 'connecting' | 'online' | 'offline';
  offlineSince: number | null;
}

const EVENTS = '/api/v1/events';
/** The server speaks at least every 15 s; after this long without a word the line is dead. */
const DEAD_AFTER_MS = 40_000;
/** A break shorter than this is not shown. */
const SHOWN_AFTER_MS = 3_000;
/** Browsers allow six lines to one server: a page nobody looks at gives its line back. */
const HIDDEN_FOR_MS = 60_000;
/** Changes are gathered this long, so that a burst asks once. */
const GATHER_MS = 250;
const RETRY_MS = { first: 1_000, most: 30_000 };

/** What an open page has to ask again for, after a change. */
export function touches(change: Pick<Change, 'kind' | 'batch'>): (path: string) => boolean {
  const batch = change.batch ? isOfBatch(change.batch) : () => false;
  const series = (path: string) => batch(path) && path.includes('/series');
  const log = (path: string) => batch(path) && path.includes('/entries');
  const shelf = isPath('/shelf');
  switch (change.kind) {
    case 'reading':
      return (path) => series(path) || shelf(path) || path.startsWith('/sensors');
    case 'assessment':
      // A sensor's page says what the judgement holds of it.
      return (path) => (batch(path) && !series(path) && !log(path)) || shelf(path) || isPath('/batches')(path) || /^\/sensors\/[^/]+\/health$/.test(path);
    case 'entry':
    case 'batch':
      return (path) => batch(path) || shelf(path) || isPath('/batches')(path);
    case 'alert':
      return (path) => isPath('/alerts')(path) || isPath('/mutes')(path) || isPath('/messages')(path) || shelf(path) || isPath('/batches')(path) || (change.batch ? isPath(`/batches/${change.batch}`)(path) : false);
    case 'sensor':
      return (path) => path.startsWith('/sensors') || isPath('/sensor-health')(path) || shelf(path) || batch(path);
    case 'must':
      return (path) => path.startsWith('/musts') || path.startsWith('/catalogue');
    case 'job':
      return (path) => isPath('/jobs')(path);
    case 'lot':
      return (path) => path.startsWith('/lots') || path.startsWith('/places') || isPath('/jobs')(path) || batch(path);
    case 'member':
      return (path) => path.startsWith('/members') || path.startsWith('/invitations') || isPath('/me')(path);
    case 'share':
      return (path) => path.startsWith('/shares') || batch(path);
  }
}

/** The one line of this page to the server's changes: opens when somebody listens, mends itself, closes with the last. */
class LiveLine {
  private state: LiveState = { state: 'connecting', offlineSince: null };
  private listeners = new Set<() => void>();
  private users = 0;
  private source: EventSource | null = null;
  private wasOpen = false;
  private retryMs = RETRY_MS.first;
  private timers: Partial<Record<'retry' | 'dead' | 'shown' | 'hidden' | 'gather', ReturnType<typeof setTimeout>>> = {};
  private gathered: Change[] = [];
  private downSince: number | null = null;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  readonly snapshot = (): LiveState => this.state;

  use(): () => void {
    if (this.users++ === 0) this.begin();
    return () => {
      if (--this.users === 0) this.end();
    };
  }

  private begin() {
    document.addEventListener('visibilitychange', this.onVisibility);
    window.addEventListener('online', this.onNetwork);
    window.addEventListener('offline', this.onNetwork);
    this.open();
  }

  private end() {
    document.removeEventListener('visibilitychange', this.onVisibility);
    window.removeEventListener('online', this.onNetwork);
    window.removeEventListener('offline', this.onNetwork);
    this.close();
    this.clear('retry', 'shown', 'hidden', 'gather');
    this.wasOpen = false;
    this.set({ state: 'connecting', offlineSince: null });
  }

  private open() {
    this.close();
    this.clear('retry');
    const source = new EventSource(EVENTS);
    this.source = source;
    source.onopen = () => {
      // A page opened without a network has missed as much as one whose line broke.
      const again = this.wasOpen || this.downSince !== null;
      this.wasOpen = true;
      this.retryMs = RETRY_MS.first;
      this.downSince = null;
      this.clear('shown');
      this.heard();
      this.set({ state: 'online', offlineSince: null });
      // What changed while the line was down was not heard.
      if (again) void refresh(() => true);
    };
    source.onerror = () => this.lost();
    source.addEventListener('beat', () => this.heard());
    source.addEventListener('change', (event: MessageEvent<string>) => {
      this.heard();
      this.gather(JSON.parse(event.data) as Change);
    });
    this.heard();
  }

  private close() {
    this.clear('dead');
    this.source?.close();
    this.source = null;
  }

  /** The browser's own reconnection gives up on any HTTP error, so the line is opened anew here. */
  private lost() {
    this.close();
    // A line that was cut may mean that the person no longer belongs here: /me says so.
    void refresh(isPath('/me'));
    this.downSince ??= Date.now();
    const since = this.downSince;
    this.timers.shown ??= setTimeout(() => this.set({ state: 'offline', offlineSince: since }), SHOWN_AFTER_MS);
    this.clear('retry');
    this.timers.retry = setTimeout(() => this.open(), this.retryMs * (0.7 + 0.6 * Math.random()));
    this.retryMs = Math.min(this.retryMs * 2, RETRY_MS.most);
  }

  private heard() {
    this.clear('dead');
    this.timers.dead = setTimeout(() => this.lost(), DEAD_AFTER_MS);
  }

  private gather(change: Change) {
    this.gathered.push(change);
    this.timers.gather ??= setTimeout(() => {
      const matches = this.gathered.map(touches);
      this.gathered = [];
      delete this.timers.gather;
      void refresh((path) => matches.some((match) => match(path)));
    }, GATHER_MS);
  }

  private onVisibility = () => {
    this.clear('hidden');
    if (document.visibilityState === 'hidden') this.timers.hidden = setTimeout(() => this.close(), HIDDEN_FOR_MS);
    else if (!this.source) this.open();
  };

  private onNetwork = () => {
    if (!navigator.onLine) this.lost();
    else this.open();
  };

  private clear(...names: Array<keyof LiveLine['timers']>) {
    for (const name of names) {
      clearTimeout(this.timers[name]);
      delete this.timers[name];
    }
  }

  private set(state: LiveState) {
    if (state.state === this.state.state && state.offlineSince === this.state.offlineSince) return;
    this.state = state;
    for (const listener of this.listeners) listener();
  }
}

export const liveLine = new LiveLine();
