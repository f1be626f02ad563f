import { createTransport } from "nodemailer";
import type { Config } from "@server/config";

export interface MailMessage {
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

export type SendMail = (message: MailMessage) => Promise<void>;

/** Sends over SMTP. Rejects with the server's words when it does not take the message. */
export function smtpSender({ smtpUrl, mailFrom }: Pick<Config, "smtpUrl" | "mailFrom">): {
  send: SendMail;
  close(): void;
} {
  const transport = createTransport({
    url: smtpUrl,
    connectionTimeout: 10_000,
    greetingTimeout: 10_000,
    socketTimeout: 20_000,
  });
  return {
    async send(message) {
      await transport.sendMail({ from: mailFrom, ...message });
    },
    close: () => transport.close(),
  };
}
