import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import { VALUE_FORM_ENTRIES } from '@/lib/rules/canonical-form';

/** How the hash of a value is made, to be made again from a row and its inputs, with an example. */
export function CanonicalForm({ example }: { example: { canonical: string; valueSha256: string } }) {
  return (
    <article className="flex max-w-220 flex-col gap-4 px-4 py-6 text-14 md:px-6">
      <h2 id="value-sha256">The hash of a value</h2>
      <p>
        <code>value_sha256</code> in a row is the SHA-256, in lower-case hex, of the value’s canonical text in UTF-8. The text holds everything that the value follows from and the numbers that followed: rows with equal hashes are equal values, and a row whose numbers were changed does not
        give its hash.
      </p>
      <p>
        The text is one JSON array without white space, with the entries below in this order. What is not given is <code>null</code>. A number is written as the shortest decimal that reads back as the same double, in ECMAScript’s spelling, as it stands in the exported files; a zero has no
        sign. Text is taken as it is; in JSON only the quotation mark, the backslash and control characters are escaped.
      </p>
      <Table>
        <caption className="sr-only">Entries of the canonical text</caption>
        <thead>
          <tr>
            <TableHead className="w-10 text-right">Entry</TableHead>
            <TableHead>What it holds</TableHead>
            <TableHead>Cell of the row, or field of the inputs</TableHead>
          </tr>
        </thead>
        <tbody>
          {VALUE_FORM_ENTRIES.map((entry, index) => (
            <TableRow key={entry.what}>
              <TableCell className="py-1.5 text-right align-top font-mono text-13 text-ink-3">{index}</TableCell>
              <TableCell className="py-1.5 whitespace-normal">{entry.what}</TableCell>
              <TableCell className="py-1.5 align-top font-mono text-13 whitespace-normal text-ink-2">{entry.from}</TableCell>
            </TableRow>
          ))}
        </tbody>
      </Table>
      <p>
        What a row does not hold comes from <code>GET /api/v1/shows/SHOW/value-inputs</code>, with <code>?shot=</code> for what is locked for a shot. An item belongs to the row with the same <code>part_id</code> and <code>value_sha256</code>.
      </p>
      <h3>Example</h3>
      <p>An oak cube with edges of 20 cm and 700 kg/m³. Its canonical text, in one line:</p>
      <pre className="overflow-x-auto rounded-4 border border-rule bg-bench p-3 font-mono text-12 break-all whitespace-pre-wrap" tabIndex={0}>
        {example.canonical}
      </pre>
      <p>
        Its hash: <code className="font-mono text-13 break-all">{example.valueSha256}</code>
      </p>
    </article>
  );
}
