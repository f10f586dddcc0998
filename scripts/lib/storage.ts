import { mkdirSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import S3rver from 's3rver';

export interface LocalStorage {
  port: number;
  close(): Promise<void>;
}

/** Starts the stand-in on loopback; what is kept there outlives it. Port 0: any free one. */
export async function startLocalStorage({ directory, port, bucket }: { directory: string; port: number; bucket: string }): Promise<LocalStorage> {
  mkdirSync(directory, { recursive: true });
  const server = new S3rver({ address: '127.0.0.1', port, directory, silent: true, resetOnClose: false, configureBuckets: [{ name: bucket, configs: [] }] });
  const address = (await server.run()) as AddressInfo;
  return { port: address.port, close: async () => void (await server.close()) };
}
