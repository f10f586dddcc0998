import { join } from 'node:path';
import { env, FIRST_S3_PORT } from '@/lib/config/env';
import { startLocalStorage } from '../lib/storage';

/** The local stand-in for object storage: files under DATA_DIR, reached as any S3 is. */
const { close, port } = await startLocalStorage({ directory: join(env().DATA_DIR, 'uploads'), port: env().S3_PORT ?? FIRST_S3_PORT, bucket: env().S3_BUCKET });
console.log(`storage ready on ${port}`);
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, () => void close().then(() => process.exit(0)));
