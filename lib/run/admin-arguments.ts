import { parseArgs } from 'node:util';

/** One thing to do, as the command line said it; values are checked by the verb's own schema. */
export type Order =
  | { verb: 'user add'; input: { email: string; name: string; admin: boolean } }
  | { verb: 'user disable'; input: { email: string } }
  | { verb: 'token add'; input: { user: string; name: string; days: number | null } }
  | { verb: 'token revoke'; input: { id: string } }
  | { verb: 'member set'; input: { show: string; email: string; role: string } }
  | { verb: 'storage check'; input: { deep: boolean; mend: boolean } };

const USAGE = `Usage: npm run --silent admin -- COMMAND
  user add EMAIL --name NAME [--admin]         adds a person and prints their invitation link
  user disable EMAIL                           ends a person's sessions and tokens
  token add --user EMAIL --name NAME [--days N]  prints a new token, alone
  token revoke ID                              ends a token
  member set SHOW EMAIL ROLE                   gives a person a role in a show
  storage check [--deep] [--mend]              compares database and storage; exit code 1 when something is wrong
                                               (deep: reads every file; mend: removes what is damaged or not needed)`;

const OPTIONS = {
  name: { type: 'string' },
  admin: { type: 'boolean' },
  user: { type: 'string' },
  days: { type: 'string' },
  deep: { type: 'boolean' },
  mend: { type: 'boolean' },
} as const;

/** What each command takes: how many words after its own two, and which options. */
const SHAPES: Record<Order['verb'], { words: number; needs: string[]; may: string[] }> = {
  'user add': { words: 1, needs: ['name'], may: ['admin'] },
  'user disable': { words: 1, needs: [], may: [] },
  'token add': { words: 0, needs: ['user', 'name'], may: ['days'] },
  'token revoke': { words: 1, needs: [], may: [] },
  'member set': { words: 3, needs: [], may: [] },
  'storage check': { words: 0, needs: [], may: ['deep', 'mend'] },
};

/** Reads the command line; what it does not understand is answered with the reason and the usage. */
export function parseOrder(argv: string[]): Order | { usage: string } {
  const refuse = (reason: string) => ({ usage: `${reason}\n${USAGE}` });
  let parsed;
  try {
    parsed = parseArgs({ args: argv, options: OPTIONS, allowPositionals: true });
  } catch (error) {
    return refuse(error instanceof Error ? error.message.split('. ')[0] + '.' : 'The options could not be read.');
  }
  const { values, positionals } = parsed;
  const [noun, act, ...words] = positionals;
  if (noun === undefined) return { usage: USAGE };
  const verb = `${noun} ${act}` as Order['verb'];
  const shape = Object.hasOwn(SHAPES, verb) ? SHAPES[verb] : null;
  if (!shape) return refuse(`There is no command "${[noun, act].filter(Boolean).join(' ')}".`);
  if (words.length !== shape.words) return refuse(`"${verb}" takes ${shape.words === 1 ? 'one word' : `${shape.words} words`}, not ${words.length}.`);
  const given = Object.keys(values);
  const missing = shape.needs.find((name) => !given.includes(name));
  if (missing) return refuse(`"${verb}" needs --${missing}.`);
  const stranger = given.find((name) => !shape.needs.includes(name) && !shape.may.includes(name));
  if (stranger) return refuse(`"${verb}" has no --${stranger}.`);
  if (values.days !== undefined && !/^\d+$/.test(values.days)) return refuse('--days takes a whole number.');
  switch (verb) {
    case 'user add':
      return { verb, input: { email: words[0], name: values.name!, admin: values.admin ?? false } };
    case 'user disable':
      return { verb, input: { email: words[0] } };
    case 'token add':
      return { verb, input: { user: values.user!, name: values.name!, days: values.days === undefined ? null : Number(values.days) } };
    case 'token revoke':
      return { verb, input: { id: words[0] } };
    case 'member set':
      return { verb, input: { show: words[0], email: words[1], role: words[2] } };
    case 'storage check':
      return { verb, input: { deep: values.deep ?? false, mend: values.mend ?? false } };
  }
}
