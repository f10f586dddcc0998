import type { Socket } from 'node:net';
import { systemClock, type Clock } from '@/lib/clock';
import { logFor } from '@/lib/log';

const log = logFor('broker');

/** What the MQTT library itself does not bound. Each is there because without it one sender can take the whole. */
export interface Limits {
  /** Open connections in all, and from one address (a whole club behind one router). */
  connections: number;
  connectionsPerAddress: number;
  /** From accepting a connection to a right secret, ms. */
  signInMs: number;
  /** The first packet, and all bytes together until the sign-in is through. */
  connectBytes: number;
  bytesBeforeSignIn: number;
  /** Any later packet: 500 readings with every field are about 80 kB. */
  packetBytes: number;
  /** A packet that was begun must be whole in this time, ms. */
  packetMs: number;
  /** Messages of one connection: what it may send at once, and per second after that. Each kilobyte counts as a message. */
  burst: number;
  perSecond: number;
}

export const LIMITS: Limits = {
  connections: 4_000,
  connectionsPerAddress: 1_500,
  signInMs: 10_000,
  connectBytes: 4_096,
  bytesBeforeSignIn: 65_536,
  packetBytes: 262_144,
  packetMs: 30_000,
  burst: 2_000,
  perSecond: 250,
};

const PUBLISH = 3;
const CONNECT = 1;
const SWEEP_MS = 1_000;
const REPORT_EVERY_SWEEPS = 10;

/**
 * Stands between a socket and the broker: follows the packet frames (MQTT 3.1.1,
 * section 2.2) without reading what is in them, and lets no byte through that
 * would break a limit. It slows a sender down by not reading, so that TCP holds
 * it back and nothing is lost.
 */
class Guard {
  signedIn = false;
  private readonly openedAt: number;
  private bytes = 0;
  private packets = 0;
  private type = 0;
  /** Bytes of the packet still to come; its length while that is being read. */
  private remaining = 0;
  private length = 0;
  /** Bits of the length read so far; -1 between packets. */
  private shift = -1;
  private begunAt = 0;
  private allowance: number;
  private allowanceAt: number;
  private timer: NodeJS.Timeout | undefined;
  private readingOn = false;

  constructor(
    private readonly socket: Socket,
    private readonly limits: Limits,
    private readonly clock: Clock,
    private readonly door: Door,
  ) {
    this.openedAt = clock.now();
    this.allowance = limits.burst;
    this.allowanceAt = this.openedAt;
    const read = socket.read.bind(socket);
    // The library takes data only through read(); null means "nothing yet" to it.
    socket.read = (size?: number): unknown => {
      if (!this.mayRead()) return null;
      const chunk: unknown = read(size);
      if (!Buffer.isBuffer(chunk)) return chunk;
      const broken = this.inspect(chunk);
      if (broken === null) return chunk;
      this.close(broken);
      return null;
    };
    // The library leaves a chunk unread while packets of the one before are open: a sender's ping behind
    // readings that wait for the database would go unanswered, and its connection would be given up.
    socket.on('readable', () => this.readOn());
    socket.once('close', () => clearTimeout(this.timer));
  }

  close(reason: string): void {
    if (this.socket.destroyed) return;
    this.door.count(reason);
    this.socket.destroy();
  }

  /** Tells the broker to try reading again. */
  wake(): void {
    if (!this.socket.destroyed) this.socket.emit('readable');
  }

  /** Asks the library to read until it does; what may be open at once is bounded here. */
  private readOn(): void {
    if (this.readingOn) return;
    this.readingOn = true;
    process.nextTick(() => {
      for (let asked = 0; asked < this.limits.burst && this.signedIn && !this.socket.destroyed && this.socket.readableLength > 0 && this.mayRead(); asked += 1) this.wake();
      this.readingOn = false;
    });
  }

  /** Closes what takes too long. */
  sweep(now: number): void {
    if (!this.signedIn && now - this.openedAt > this.limits.signInMs) this.close('did not sign in in time');
    // Bytes that wait unread are our own slowness, not the sender's.
    else if (this.begunAt > 0 && now - this.begunAt > this.limits.packetMs && this.socket.readableLength === 0) this.close('did not finish a packet in time');
  }

  private mayRead(): boolean {
    if (this.door.isFull) {
      this.door.waiting.add(this);
      return false;
    }
    if (this.allowance >= 0) return true;
    const now = this.clock.now();
    this.allowance = Math.min(this.limits.burst, this.allowance + ((now - this.allowanceAt) / 1000) * this.limits.perSecond);
    this.allowanceAt = now;
    if (this.allowance >= 0) return true;
    if (this.timer === undefined) {
      this.door.count('slowed down');
      this.timer = setTimeout(
        () => {
          this.timer = undefined;
          this.wake();
        },
        Math.ceil((-this.allowance / this.limits.perSecond) * 1000),
      );
    }
    return false;
  }

  /** Follows the frames through a chunk; the reason where one breaks a limit. */
  private inspect(chunk: Buffer): string | null {
    if (!this.signedIn) {
      this.bytes += chunk.length;
      if (this.bytes > this.limits.bytesBeforeSignIn) return 'sent too much before its sign-in';
    }
    let at = 0;
    while (at < chunk.length) {
      if (this.remaining > 0) {
        const step = Math.min(this.remaining, chunk.length - at);
        this.remaining -= step;
        at += step;
      } else if (this.shift < 0) {
        this.type = chunk[at]! >> 4;
        this.shift = 0;
        this.length = 0;
        at += 1;
      } else {
        const byte = chunk[at]!;
        at += 1;
        this.length |= (byte & 0x7f) << this.shift;
        this.shift += 7;
        if (byte & 0x80) {
          if (this.shift > 21) return 'sent a packet length of more than four bytes';
          continue;
        }
        const broken = this.begin();
        if (broken) return broken;
      }
    }
    const whole = this.remaining === 0 && this.shift < 0;
    this.begunAt = whole ? 0 : this.begunAt || this.clock.now();
    return null;
  }

  private begin(): string | null {
    this.shift = -1;
    this.remaining = this.length;
    this.begunAt = 0;
    this.packets += 1;
    if (this.packets === 1 && this.type !== CONNECT) return 'did not begin with CONNECT';
    if (this.length > (this.packets === 1 ? this.limits.connectBytes : this.limits.packetBytes)) return 'sent too large a packet';
    if (this.type === PUBLISH) this.spend(Math.max(1, this.length / 1024));
    return null;
  }

  private spend(cost: number): void {
    const now = this.clock.now();
    this.allowance = Math.min(this.limits.burst, this.allowance + ((now - this.allowanceAt) / 1000) * this.limits.perSecond) - cost;
    this.allowanceAt = now;
  }
}

/** All connections together. */
export class Door {
  /** Connections that want to read while the ingest is full. */
  readonly waiting = new Set<Guard>();
  private full = false;
  private readonly guards = new Map<Socket, Guard>();
  private readonly perAddress = new Map<string, number>();
  private readonly counted = new Map<string, number>();
  private readonly sweeper: NodeJS.Timeout;
  private sweeps = 0;

  constructor(
    private readonly limits: Limits = LIMITS,
    private readonly clock: Clock = systemClock,
  ) {
    this.sweeper = setInterval(() => this.sweep(), SWEEP_MS);
  }

  /** Guards a new connection, or closes it where there are too many. */
  admit(socket: Socket): boolean {
    const address = addressOf(socket);
    const fromThere = this.perAddress.get(address) ?? 0;
    if (this.guards.size >= this.limits.connections || fromThere >= this.limits.connectionsPerAddress) {
      this.count('turned away: too many connections');
      socket.destroy();
      return false;
    }
    // A device that lost its power never says goodbye.
    socket.setKeepAlive(true, 60_000).setNoDelay(true);
    this.perAddress.set(address, fromThere + 1);
    const guard = new Guard(socket, this.limits, this.clock, this);
    this.guards.set(socket, guard);
    socket.once('close', () => {
      this.guards.delete(socket);
      this.waiting.delete(guard);
      const left = (this.perAddress.get(address) ?? 1) - 1;
      if (left > 0) this.perAddress.set(address, left);
      else this.perAddress.delete(address);
    });
    return true;
  }

  signedIn(socket: Socket): void {
    const guard = this.guards.get(socket);
    if (guard) guard.signedIn = true;
  }

  get isFull(): boolean {
    return this.full;
  }

  get connections(): number {
    return this.guards.size;
  }

  /** While full, no connection is read from. */
  setFull(full: boolean): void {
    this.full = full;
    if (full) return;
    const waiting = [...this.waiting];
    this.waiting.clear();
    for (const guard of waiting) guard.wake();
  }

  /** Counts what was closed or slowed down; said in the log from time to time, not a line each. */
  count(what: string): void {
    this.counted.set(what, (this.counted.get(what) ?? 0) + 1);
  }

  close(): void {
    clearInterval(this.sweeper);
    for (const socket of this.guards.keys()) socket.destroy();
    this.report();
  }

  private sweep(): void {
    const now = this.clock.now();
    for (const guard of this.guards.values()) guard.sweep(now);
    this.sweeps += 1;
    if (this.sweeps % REPORT_EVERY_SWEEPS === 0) this.report();
  }

  private report(): void {
    if (this.counted.size === 0) return;
    log.warn({ counted: Object.fromEntries(this.counted) }, 'connections were closed or slowed down');
    this.counted.clear();
  }
}

/** The address that limits go by; with IPv6 a household's whole network (RFC 4291: /64). */
export function addressOf(socket: Socket): string {
  const address = socket.remoteAddress ?? 'unknown';
  if (address.startsWith('::ffff:')) return address.slice(7);
  return address.includes(':') ? address.split(':').slice(0, 4).join(':') : address;
}
