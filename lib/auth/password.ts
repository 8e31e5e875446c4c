import { hash, verify } from '@node-rs/argon2';

/** OWASP's password storage sheet: Argon2id (the library's default), 19 MiB, two passes, one lane. */
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

export function hashPassword(password: string): Promise<string> {
  return hash(password, COST);
}

let decoy: Promise<string> | null = null;

/** Whether the password fits the hash. Without a hash the same work is done, so that time does not tell who has an account. */
export async function passwordFits(passwordHash: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword('nobody has this one');
  const fits = await verify(passwordHash ?? (await decoy), password);
  return passwordHash !== null && fits;
}
