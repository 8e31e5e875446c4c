import { createHash, randomBytes } from 'node:crypto';

/** A new secret for a token or a link: 256 random bits, URL-safe. */
export function newSecret(prefix = ''): string {
  return prefix + randomBytes(32).toString('base64url');
}

/** SHA-256 of a secret, hexadecimal. The secrets are random, so that a slow hash would add nothing. */
export function secretHash(secret: string): string {
  return createHash('sha256').update(secret).digest('hex');
}
