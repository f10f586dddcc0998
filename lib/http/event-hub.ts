import 'server-only';
import { may, type Actor } from '../auth/policies';
import { stillIn, type LetIn } from '../auth/session';
import { EVERY_CELLAR, type Change } from '../contracts/events';
import { logFor } from '../log';
import { hearChanges } from '../services/changes';
import { databaseIsAway } from './problem';

/** So that a line through proxies stays open, and a browser sees that it is dead. */
const BEAT_MS = 15_000;
/** A sign-in runs out, or lies unused for too long, without a word: its stream ends within this. */
const RECHECK_MS = 5_000;
/** A reader that has not taken this many messages is gone or hostile. */
const MOST_BEHIND = 256;
const RECONNECT_MS = 2_000;
/** A page asks for its data first and hears second: what changed between the two is told again to a stream that opens. */
const AGAIN_MS = 15_000;
const MOST_AGAIN = 2_000;

const log = logFor('events');
const encoder = new TextEncoder();

interface Stream extends LetIn {
  controller: ReadableStreamDefaultController<Uint8Array>;
}

const messageOf = (change: Change) => `event: change\ndata: ${JSON.stringify(change)}\n\n`;
const concerns = (change: Change, { actor }: Stream) => actor.cellarId === change.cellar && (change.kind !== 'alert' || may(actor.role, 'alerts.read'));

/** All open event streams of this server, fed by one connection that listens to PostgreSQL. */
class EventHub {
  private readonly streams = new Set<Stream>();
  /** Each change of late once, by what it says, with when it was last said; the oldest first. */
  private readonly lately = new Map<string, { at: number; change: Change }>();
  private line: ReturnType<typeof hearChanges> | null = null;
  private beats: NodeJS.Timeout | undefined;
  private checks: NodeJS.Timeout | undefined;
  private stopping = false;

  /** A stream of one cellar's changes, open until the client goes, may no longer listen, or the server stops. */
  open(actor: Actor, session: Stream['session'], gone: AbortSignal): ReadableStream<Uint8Array> {
    let stream: Stream | undefined;
    return new ReadableStream<Uint8Array>(
      {
        start: (controller) => {
          stream = { actor, session, controller };
          controller.enqueue(encoder.encode(`retry: ${RECONNECT_MS}\nevent: beat\ndata:\n\n`));
          if (this.stopping) return controller.close();
          this.streams.add(stream);
          const opened = stream;
          this.tellAgain(opened);
          gone.addEventListener('abort', () => this.drop(opened), { once: true });
        },
        cancel: () => stream && this.drop(stream),
      },
      new CountQueuingStrategy({ highWaterMark: MOST_BEHIND }),
    );
  }

  get size(): number {
    return this.streams.size;
  }

  /** Closes every stream, so that the server can end: an open one would keep it alive. */
  async stop(): Promise<void> {
    this.stopping = true;
    for (const stream of [...this.streams]) this.drop(stream);
    await this.line?.close();
  }

  /** Begins to hear, before the first page asks: what is said while nobody listens is lost. */
  begin(): void {
    this.line ??= hearChanges({
      onChange: (change) => void this.heard(change),
      onError: (error) => log.warn({ err: error }, 'trouble on the line to the database'),
      onConnect: () => this.connected(),
    });
    this.beats ??= setInterval(() => this.send(() => 'event: beat\ndata:\n\n'), BEAT_MS).unref();
    this.checks ??= setInterval(() => void this.recheck(), RECHECK_MS).unref();
  }

  /** What was said while the line was down went unheard: streams end, and the pages that come back ask for everything. */
  private connected(): void {
    for (const stream of [...this.streams]) this.drop(stream);
  }

  /** Who may no longer listen is gone before anything more is told. */
  private async heard(change: Change): Promise<void> {
    if (change.kind === 'member') await this.recheck((stream) => change.person === undefined || stream.actor.personId === change.person);
    if (change.cellar !== EVERY_CELLAR) this.tell(change);
  }

  private tell({ person: _, ...change }: Change): void {
    const message = messageOf(change);
    this.lately.delete(message);
    this.lately.set(message, { at: Date.now(), change });
    this.forget();
    this.send((stream) => (concerns(change, stream) ? message : null));
  }

  private tellAgain(stream: Stream): void {
    this.forget();
    const messages = [...this.lately].filter(([, { change }]) => concerns(change, stream)).map(([message]) => message);
    // In one piece: many small ones would look like a reader that has fallen behind.
    if (messages.length > 0) this.write(stream, messages.join(''));
  }

  private forget(): void {
    const since = Date.now() - AGAIN_MS;
    for (const [message, { at }] of this.lately) {
      if (at >= since && this.lately.size <= MOST_AGAIN) return;
      this.lately.delete(message);
    }
  }

  private send(messageFor: (stream: Stream) => string | null): void {
    for (const stream of [...this.streams]) {
      const message = messageFor(stream);
      if (message !== null) this.write(stream, message);
    }
  }

  private write(stream: Stream, message: string): void {
    if ((stream.controller.desiredSize ?? 0) <= 0) this.drop(stream);
    else stream.controller.enqueue(encoder.encode(message));
  }

  /** Ends the streams whose sign-in or membership has ended; a database that does not answer ends none. */
  private async recheck(which: (stream: Stream) => boolean = () => true): Promise<void> {
    try {
      const asked = [...this.streams].filter(which);
      const open = await stillIn(asked);
      for (const stream of asked) if (!open.has(stream)) this.drop(stream);
    } catch (error) {
      if (!databaseIsAway(error)) log.error({ err: error }, 'could not check a sign-in');
    }
  }

  private drop(stream: Stream): void {
    if (!this.streams.delete(stream)) return;
    try {
      stream.controller.close();
    } catch {
      // The client went first and closed it.
    }
  }
}

// Next.js may load a module once for routes and once for instrumentation: the hub is the process's.
const held = globalThis as typeof globalThis & { fallbrightEventHub?: EventHub };
export const eventHub = (): EventHub => (held.fallbrightEventHub ??= new EventHub());
