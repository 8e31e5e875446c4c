import type { AddressInfo } from 'node:net';
import { SMTPServer } from 'smtp-server';

export interface TakenMail {
  from: string;
  to: string[];
  source: string;
}

export interface TestSmtp {
  url: string;
  taken: TakenMail[];
  /** Decides about a recipient; throw an error with responseCode to refuse. */
  onRecipient: (address: string) => void;
  /** Runs after a message was read in full and before the server says so. */
  onMessage: (mail: TakenMail) => void | Promise<void>;
  close: () => Promise<void>;
}

/** A mail server on loopback that keeps what it takes. */
export async function startSmtp(): Promise<TestSmtp> {
  const smtp: TestSmtp = {
    url: '',
    taken: [],
    onRecipient: () => undefined,
    onMessage: () => undefined,
    close: () => Promise.resolve(),
  };
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    onRcptTo(address, _session, done) {
      try {
        smtp.onRecipient(address.address);
        done();
      } catch (error) {
        done(error as Error);
      }
    },
    onData(stream, session, done) {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => {
        const { mailFrom, rcptTo } = session.envelope;
        const mail = {
          from: mailFrom ? mailFrom.address : '',
          to: rcptTo.map((one) => one.address),
          source: Buffer.concat(chunks).toString('utf8'),
        };
        Promise.resolve()
          .then(() => smtp.onMessage(mail))
          .then(
            () => {
              smtp.taken.push(mail);
              done();
            },
            (error: Error) => done(error),
          );
      });
    },
  });
  server.on('error', () => undefined);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  smtp.url = `smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`;
  smtp.close = () => new Promise((resolve) => server.close(() => resolve()));
  return smtp;
}

/** An error as the server answers it, with this reply code. */
export function refusal(responseCode: number, message: string): Error {
  return Object.assign(new Error(message), { responseCode });
}
