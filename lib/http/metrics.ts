import 'server-only';
import { collectDefaultMetrics, Gauge, Histogram, Registry } from 'prom-client';
import { health } from '../services/health';
import { eventHub } from './event-hub';

interface Metrics {
  registry: Registry;
  requests: Histogram<'method' | 'route' | 'status'>;
}

function make(): Metrics {
  const registry = new Registry();
  collectDefaultMetrics({ register: registry });
  const requests = new Histogram({
    name: 'fallbright_http_request_seconds',
    help: 'Time to answer an API request',
    labelNames: ['method', 'route', 'status'],
    buckets: [0.005, 0.01, 0.025, 0.05, 0.1, 0.25, 0.5, 1, 2.5, 8],
    registers: [registry],
  });
  new Gauge({
    name: 'fallbright_event_streams',
    help: 'Pages that listen for changes',
    registers: [registry],
    collect() {
      this.set(eventHub().size);
    },
  });
  new Gauge({
    name: 'fallbright_part_up',
    help: '1 while a part of the house works',
    labelNames: ['part'],
    registers: [registry],
    async collect() {
      for (const [part, state] of Object.entries((await health()).parts)) this.set({ part }, state === 'ok' ? 1 : 0);
    },
  });
  return { registry, requests };
}

// Next.js may load a module more than once: the counts are the process's.
const held = globalThis as typeof globalThis & { fallbrightMetrics?: Metrics };
export const metrics = (): Metrics => (held.fallbrightMetrics ??= make());
