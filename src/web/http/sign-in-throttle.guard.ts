import { Injectable } from '@nestjs/common';
import { ThrottlerGuard, type ThrottlerModuleOptions } from '@nestjs/throttler';

const minuteMs = 60_000;

/** How often one address may try to sign in. */
export const signInThrottle: ThrottlerModuleOptions = {
  throttlers: [{ name: 'sign-in', ttl: 5 * minuteMs, limit: 20, blockDuration: 5 * minuteMs }],
};

/** Stops guessing of passwords and links: each address has a few tries, then waits. */
@Injectable()
export class SignInThrottle extends ThrottlerGuard {}
