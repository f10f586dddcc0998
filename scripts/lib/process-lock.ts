import { createHash } from 'node:crypto';
import { createServer } from 'node:net';

export interface Lock {
  free(): Promise<void>;
}

/**
 * Takes a lock by name, or answers null while another process or caller holds it.
 * It is a socket in Linux's abstract space, which one alone can listen on and which
 * the kernel takes back the moment its process ends, however it ends.
 */
export function takeLock(name: string): Promise<Lock | null> {
  // A socket's path is short.
  const path = `\0fallbright-${createHash('sha256').update(name).digest('hex').slice(0, 32)}`;
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.unref();
    server.once('error', (error: NodeJS.ErrnoException) => (error.code === 'EADDRINUSE' ? resolve(null) : reject(error)));
    server.listen({ path, exclusive: true }, () => resolve({ free: () => new Promise((done) => server.close(() => done())) }));
  });
}
