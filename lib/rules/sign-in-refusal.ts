/** A sentence for what next-auth says about a refused sign-in. The time is in the reader's own zone. */
export function signInRefusal(error: string | null | undefined): string {
  const tooMany = /^too_many_attempts:(\d{1,16})$/.exec(error ?? '');
  if (tooMany) {
    const until = new Date(Number(tooMany[1]));
    const time = until.toLocaleTimeString('en-GB', { hour: '2-digit', minute: '2-digit', second: '2-digit' });
    return `Too many attempts for this address. Try again at ${time}.`;
  }
  if (error === 'CredentialsSignin') return 'E-mail or password is wrong.';
  return 'Signing in did not work. Try again.';
}
