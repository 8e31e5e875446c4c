import { EMAIL_AS_PASSWORD, isTheEmail } from '@/lib/rules/password-rule';
import { StudioError } from '@/lib/rules/studio-error';

/** The part of the password rule that needs to know whose it is; the length was checked with the input. */
export function refuseWeakPassword(password: string, email: string): void {
  if (isTheEmail(password, email)) throw new StudioError('bad_input', EMAIL_AS_PASSWORD, { field: 'password' });
}
