import type { TakenMail } from './smtp';

/** The plain-text part of a message and its subject, decoded. */
export function readMail({ source }: TakenMail): { subject: string; text: string } {
  const end = source.indexOf('\r\n\r\n');
  const head = source.slice(0, end).replace(/\r\n[ \t]+/g, ' ');
  const boundary = /boundary="([^"]+)"/.exec(head)?.[1];
  if (!boundary) throw new Error('The message has no parts.');
  const part = source.split(`--${boundary}`).find((one) => /^content-type: text\/plain/im.test(one));
  if (!part) throw new Error('The message has no plain text.');
  const [partHead, ...body] = part.replace(/^\r\n/, '').split('\r\n\r\n');
  const encoded = body.join('\r\n\r\n');
  const encoding = /content-transfer-encoding: (\S+)/i.exec(partHead)?.[1];
  const text = encoding === 'base64' ? Buffer.from(encoded, 'base64').toString('utf8') : encoding === 'quoted-printable' ? decodeQuoted(encoded.replace(/=\r\n/g, '')) : encoded;
  return { subject: decodeWords(/^subject: (.*)$/im.exec(head)?.[1] ?? ''), text: text.replaceAll('\r\n', '\n').trim() };
}

function decodeQuoted(text: string): string {
  const bytes = text.replace(/=([0-9A-F]{2})/g, (_, hex: string) => String.fromCharCode(Number.parseInt(hex, 16)));
  return Buffer.from(bytes, 'latin1').toString('utf8');
}

function decodeWords(text: string): string {
  return text.replace(/\?=\s+=\?/g, '?==?').replace(/=\?utf-8\?([BQ])\?([^?]*)\?=/gi, (_, kind: string, body: string) => (kind.toUpperCase() === 'B' ? Buffer.from(body, 'base64').toString('utf8') : decodeQuoted(body.replaceAll('_', ' '))));
}
