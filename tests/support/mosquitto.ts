import { spawn, type ChildProcess } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { connect } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { freePort } from '@/scripts/lib/postgres';
import { until } from './processes';

export interface OutsideMqtt {
  port: number;
  url: string;
  stop(): Promise<void>;
}

const PROGRAM = '/usr/sbin/mosquitto';

const answers = (port: number) =>
  new Promise<boolean>((resolve) => {
    const probe = connect(port, '127.0.0.1', () => {
      probe.destroy();
      resolve(true);
    }).on('error', () => resolve(false));
  });

/** An MQTT broker that is not ours: Debian's mosquitto, on a free port or a given one, open to everybody on loopback. */
export async function startMosquitto(wanted?: number): Promise<OutsideMqtt> {
  const folder = await mkdtemp(join(tmpdir(), 'fallbright-mosquitto-'));
  const port = wanted ?? (await freePort());
  const file = join(folder, 'mosquitto.conf');
  await writeFile(file, [`listener ${port} 127.0.0.1`, 'allow_anonymous true', 'persistence false', 'max_queued_messages 0'].join('\n'));
  const child: ChildProcess = spawn(PROGRAM, ['-c', file], { stdio: 'ignore' });
  const ended = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  process.once('exit', () => child.kill('SIGKILL'));
  await until('mosquitto to answer', () => answers(port));
  return {
    port,
    url: `mqtt://127.0.0.1:${port}`,
    stop: async () => {
      child.kill('SIGTERM');
      await ended;
      await rm(folder, { recursive: true, force: true });
    },
  };
}
