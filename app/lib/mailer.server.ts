import { createTransport } from "nodemailer";
import { env } from "./env.server.ts";

const isLoopback = ["127.0.0.1", "localhost", "::1"].includes(env.smtp.host);

const transport = createTransport({
  host: env.smtp.host,
  port: env.smtp.port,
  // Away from this machine, mail goes encrypted or not at all.
  requireTLS: !isLoopback,
  ignoreTLS: isLoopback,
  connectionTimeout: 5000,
  greetingTimeout: 5000,
  socketTimeout: 10_000,
  disableFileAccess: true,
  disableUrlAccess: true,
});

export type Mail = {
  messageId: string;
  toName: string;
  toAddress: string;
  subject: string;
  text: string;
  html: string;
};

/**
 * Hand one mail to the mail server.
 *
 * @throws Error when the server is away or refuses it
 */
export async function sendMail(mail: Mail): Promise<void> {
  await transport.sendMail({
    from: env.smtp.from,
    to: { name: mail.toName, address: mail.toAddress },
    messageId: mail.messageId,
    subject: mail.subject,
    text: mail.text,
    html: mail.html,
  });
}
