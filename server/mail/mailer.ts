import { createTransport } from 'nodemailer';
import type { Logger } from 'pino';
import type { Config } from '../config';

export interface Message {
  to: string;
  subject: string;
  /** Plain text; lines may be of any length. */
  text: string;
}

export interface Mailer {
  /** Settles when the mail server has taken the message; rejects when it does not, and the caller tries again. */
  send(message: Message): Promise<void>;
  close(): void;
}

/** Sends over SMTP, or, where no server is configured, notes in the log what was not sent. */
export function makeMailer({ mail }: Pick<Config, 'mail'>, log: Pick<Logger, 'info'>): Mailer {
  if (!mail) return unsent(log);
  const transport = createTransport(
    {
      url: mail.smtpUrl,
      // A job waits for this: minutes, as are the defaults, would hold it up for nothing.
      connectionTimeout: 10_000,
      greetingTimeout: 10_000,
      socketTimeout: 30_000,
      disableFileAccess: true,
      disableUrlAccess: true,
    },
    { from: mail.from },
  );
  return {
    async send({ to, subject, text }) {
      // Text that a person typed ends up in subjects; a header is one line.
      await transport.sendMail({
        to: { name: '', address: to },
        subject: subject.replace(/\s+/g, ' '),
        text,
      });
    },
    close: () => transport.close(),
  };
}

const unsent = (log: Pick<Logger, 'info'>): Mailer => ({
  async send({ to, subject }) {
    log.info({ to, subject }, 'mail not sent: SMTP_URL is not set');
  },
  close: () => {},
});
