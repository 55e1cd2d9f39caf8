import { createHash, createHmac, randomBytes, timingSafeEqual } from 'node:crypto';

/** 256 random bits, safe in a link and in a cookie. */
export const freshToken = (): string => randomBytes(32).toString('base64url');

/** What the database keeps of a token: enough to recognise it, useless to sign in with. */
export const tokenHash = (token: string): string =>
  createHash('sha256').update(token).digest('hex');

/** The token that the forms of one session carry: known to its pages, not to another site. */
export const formTokenOf = (sessionToken: string): string =>
  createHmac('sha256', sessionToken).update('stillair form').digest('base64url');

/** Whether two texts are equal, in a time that tells nothing about where they differ. */
export function isSameText(a: string, b: string): boolean {
  const digest = (text: string) => createHash('sha256').update(text).digest();
  return timingSafeEqual(digest(a), digest(b));
}
