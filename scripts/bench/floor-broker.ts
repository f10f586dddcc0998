import { Aedes } from 'aedes';
import { createServer } from 'node:net';
import { Client } from 'pg';

/**
 * The floor that our broker is measured against: the same MQTT library, everybody
 * let in, nothing checked, acknowledgement after the commit of a plain batched
 * insert over one connection. Arguments: port, database address.
 */
const [port, url] = process.argv.slice(2);
const client = new Client({ connectionString: url });
await client.connect();

interface Waiting {
  sensor: string;
  payload: Buffer;
  done: () => void;
}
const waiting: Waiting[] = [];
let busy = false;

const INSERT = {
  name: 'floor',
  text: `insert into floor_readings select * from unnest($1::int[], $2::timestamptz[], $3::timestamptz[], $4::float8[], $5::real[], $6::real[], $7::real[]) on conflict do nothing`,
};

async function commit(): Promise<void> {
  busy = true;
  while (waiting.length > 0) {
    const batch = waiting.splice(0, 500);
    const now = new Date().toISOString();
    const rows = batch.map(({ payload }) => JSON.parse(payload.toString()) as { at: string; gravity: number; temperature: number; battery: number; signal: number });
    const list = (values: unknown[]) => `{${values.join(',')}}`;
    await client.query({
      ...INSERT,
      values: [
        list(batch.map(({ sensor }) => sensor)),
        list(rows.map((row) => row.at)),
        list(rows.map(() => now)),
        list(rows.map((row) => row.gravity)),
        list(rows.map((row) => row.temperature)),
        list(rows.map((row) => row.battery)),
        list(rows.map((row) => row.signal)),
      ],
    });
    for (const { done } of batch) done();
  }
  busy = false;
}

const numbers = new Map<string, string>();
const aedes = await Aedes.createBroker({
  authorizePublish: (_client, packet, callback) => {
    const name = packet.topic.split('/')[2]!;
    let sensor = numbers.get(name);
    if (!sensor) numbers.set(name, (sensor = String(numbers.size + 1)));
    waiting.push({ sensor, payload: packet.payload as Buffer, done: () => callback(null) });
    if (!busy) void commit();
  },
});
createServer({ noDelay: true }, (socket) => void aedes.handle(socket)).listen(Number(port), '127.0.0.1', () => console.log('floor ready'));
