import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import { text } from 'node:stream/consumers';
import { SMTPServer } from 'smtp-server';
import type { Config } from '../config';
import { readMessage, type ReceivedMessage } from './mailMessage';
import { refuseInProduction } from './refuseInProduction';

export interface Mailbox {
  smtpUrl: string;
  /** What has come in, the oldest first. */
  messages: ReceivedMessage[];
  /** The next messages are refused as a full mail server would, until 0 is said. */
  refuse(count: number): void;
  stop(): Promise<void>;
}

/** A mail server on loopback that delivers nothing and keeps everything. */
export async function startMailbox({ env }: { env: Config['env'] }): Promise<Mailbox> {
  refuseInProduction(env, 'The local mailbox');
  const messages: ReceivedMessage[] = [];
  let refusals = 0;
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    logger: false,
    onData(stream, session, done) {
      text(stream).then((raw) => {
        if (refusals > 0) {
          refusals -= 1;
          return done(Object.assign(new Error('Insufficient system storage'), { responseCode: 452 }));
        }
        messages.push(
          readMessage(
            raw,
            session.envelope.rcptTo.map((to) => to.address),
          ),
        );
        done();
      }, done);
    },
  });
  const listening = server.listen(0, '127.0.0.1');
  await once(listening, 'listening');
  const { port } = listening.address() as AddressInfo;
  return {
    smtpUrl: `smtp://127.0.0.1:${port}?ignoreTLS=true`,
    messages,
    refuse: (count) => (refusals = count),
    stop: () => new Promise((stopped) => server.close(() => stopped())),
  };
}
