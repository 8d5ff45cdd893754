import { createTransport } from 'nodemailer';
import type { Logger } from 'pino';
import type { Config } from '../config.ts';

export interface Letter {
  to: string;
  subject: string;
  text: string;
}

export interface Mailer {
  /** Whether letters leave this machine; without a mail server, links are shown to be passed on by hand. */
  readonly sends: boolean;
  /** Hands a letter to the mail server; false when none is set up or it refused, which is logged, not thrown: the deed itself stands. */
  send(letter: Letter): Promise<boolean>;
}

/** Plain-text mail over SMTP, through the server named in the settings. */
export function createMailer(config: Pick<Config, 'smtpUrl' | 'mailFrom'>, log: Logger): Mailer {
  if (config.smtpUrl === null) return { sends: false, send: () => Promise.resolve(false) };
  const transport = createTransport(config.smtpUrl);
  return {
    sends: true,
    async send(letter) {
      try {
        await transport.sendMail({ from: config.mailFrom, ...letter });
        return true;
      } catch (error) {
        log.error({ err: error, subject: letter.subject }, 'mail not sent');
        return false;
      }
    },
  };
}
