/** A name to begin with for an address whose owner has not said theirs: `ilvo.brack@x` becomes `Ilvo Brack`. */
export function nameFromEmail(email: string): string {
  const words = email.split('@')[0].split(/[._+-]+/).filter(Boolean);
  const name = words.map((word) => word[0].toUpperCase() + word.slice(1)).join(' ');
  return name.slice(0, 120) || email.slice(0, 120);
}
