import { sql, type SQL } from 'drizzle-orm';
import type { AnyPgColumn } from 'drizzle-orm/pg-core';

/** Finite: PostgreSQL sorts NaN above Infinity, so a bare comparison with 0 would let both through. */
export function finite(column: AnyPgColumn): SQL {
  return sql`${column} > '-Infinity' and ${column} < 'Infinity'`;
}

export function finitePositive(column: AnyPgColumn): SQL {
  return sql`${column} > 0 and ${column} < 'Infinity'`;
}

export function finiteNotNegative(column: AnyPgColumn): SQL {
  return sql`${column} >= 0 and ${column} < 'Infinity'`;
}

/** The column holds one of the words; written as literals since a constraint cannot carry parameters. */
export function oneOf(column: AnyPgColumn, words: readonly string[]): SQL {
  return sql`${column} in (${sql.raw(words.map((word) => `'${word}'`).join(', '))})`;
}
