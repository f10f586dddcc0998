import { connect, createServer, type AddressInfo, type Server, type Socket } from 'node:net';

/** A road to PostgreSQL that a test can cut or block, as a network does. */
export interface Gate {
  /** The database's address by this road. */
  url: string;
  /** Breaks every connection and refuses new ones. */
  cut(): Promise<void>;
  /** Lets nothing through, and breaks nothing: what a stalled server looks like. */
  stall(): void;
  /** As before; what waited goes through. */
  open(): Promise<void>;
  close(): Promise<void>;
}

export async function gateTo(databaseUrl: string): Promise<Gate> {
  const target = new URL(databaseUrl);
  const pairs = new Set<[Socket, Socket]>();
  let stalled = false;

  const accept = (inside: Socket) => {
    const outside = connect(Number(target.port), target.hostname);
    const pair: [Socket, Socket] = [inside, outside];
    pairs.add(pair);
    for (const [from, to] of [pair, [outside, inside] as const]) {
      from.on('data', (data) => to.write(data));
      from.on('error', () => to.destroy());
      from.on('close', () => {
        pairs.delete(pair);
        to.destroy();
      });
      if (stalled) from.pause();
    }
  };

  let server: Server | null = null;
  let port = 0;
  const listen = async () => {
    server = createServer(accept);
    await new Promise<void>((done) => server!.listen(port, '127.0.0.1', done));
    port = (server.address() as AddressInfo).port;
  };
  const cut = async () => {
    const closing = server;
    server = null;
    const closed = new Promise<void>((done) => (closing ? closing.close(() => done()) : done()));
    for (const pair of pairs) for (const socket of pair) socket.destroy();
    await closed;
  };

  await listen();
  const url = new URL(databaseUrl);
  url.port = String(port);
  return {
    url: url.toString(),
    cut,
    stall() {
      stalled = true;
      for (const pair of pairs) for (const socket of pair) socket.pause();
    },
    async open() {
      stalled = false;
      for (const pair of pairs) for (const socket of pair) socket.resume();
      if (!server) await listen();
    },
    close: cut,
  };
}
