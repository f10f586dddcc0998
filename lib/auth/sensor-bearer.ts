import { RateLimiterMemory } from 'rate-limiter-flexible';
import { ThrottledError, UnauthenticatedError } from '@/lib/errors';
import { SensorDirectory, type SensorIdentity } from './sensors';

/** Wrong secrets in a minute for one name from one address. */
const WRONG_A_MINUTE = 10;
/** Messages of one sensor in a minute; with 500 readings in one that is 300,000. */
const MESSAGES_A_MINUTE = 600;

const directory = new SensorDirectory();
const wrong = new RateLimiterMemory({ points: WRONG_A_MINUTE, duration: 60 });
const messages = new RateLimiterMemory({ points: MESSAGES_A_MINUTE, duration: 60 });

/**
 * The sensor that `Authorization: Bearer <sensor>:<secret>` names.
 * @throws UnauthenticatedError where it is not right, ThrottledError after too many wrong ones or too many messages.
 */
export async function sensorOfBearer(header: string | null, address: string): Promise<SensorIdentity> {
  const match = /^Bearer ([a-z0-9-]{1,64}):([\x21-\x7e]{1,200})$/i.exec(header ?? '');
  const [, identifier, secret] = match ?? [];
  if (!identifier || !secret) throw new UnauthenticatedError('Send "Authorization: Bearer <sensor>:<secret>".');
  const key = `${address} ${identifier}`;
  const tried = await wrong.get(key);
  if (tried && tried.remainingPoints <= 0) throw new ThrottledError(Math.ceil(tried.msBeforeNext / 1000));
  const sensor = await directory.authenticate(identifier, secret);
  if (!sensor) {
    await wrong.penalty(key);
    throw new UnauthenticatedError('No sensor has this name and secret.');
  }
  const sent = await messages.penalty(sensor.id);
  if (sent.consumedPoints > MESSAGES_A_MINUTE) throw new ThrottledError(Math.ceil(sent.msBeforeNext / 1000), 'This sensor sends too often. Put several readings in one message.');
  return sensor;
}
