import 'server-only';
import { RateLimiterMemory, RateLimiterRes } from 'rate-limiter-flexible';
import { ThrottledError } from '../errors';

/** Tokens that are none, in a minute, from one address. */
const WRONG_A_MINUTE = 30;
const wrong = new RateLimiterMemory({ points: WRONG_A_MINUTE, duration: 60 });

/** @throws ThrottledError after too many. */
export async function countWrongToken(address: string): Promise<void> {
  try {
    await wrong.consume(address);
  } catch (error) {
    if (error instanceof RateLimiterRes) throw new ThrottledError(Math.ceil(error.msBeforeNext / 1000));
    throw error;
  }
}
