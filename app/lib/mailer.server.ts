import { PassThrough } from "node:stream";
import { createTransport } from "nodemailer";
import { env } from "./env.server.ts";

const isLoopback = ["127.0.0.1", "localhost", "::1"].includes(env.smtp.host);

const options = {
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
};

export type Mail = {
  messageId: string;
  toName: string;
  toAddress: string;
  subject: string;
  text: string;
  html: string;
};

/** The connection broke after the whole letter was handed over and before the server's answer: it may be on its way. */
export class UncertainDelivery extends Error {}

function isAnswer(error: unknown) {
  return error instanceof Error && "responseCode" in error && Boolean(error.responseCode);
}

/**
 * Hand one mail to the mail server.
 *
 * @throws UncertainDelivery when it may have gone out all the same; another Error when it has not
 */
export async function sendMail(mail: Mail): Promise<void> {
  // One for each letter: its errors do not say how far the letter had come, so the last byte is watched.
  const transport = createTransport(options);
  let isHandedOver = false;
  transport.use("stream", ({ message }, done) => {
    message.transform(new PassThrough().once("end", () => (isHandedOver = true)));
    done();
  });
  try {
    await transport.sendMail({
      from: env.smtp.from,
      to: { name: mail.toName, address: mail.toAddress },
      messageId: mail.messageId,
      subject: mail.subject,
      text: mail.text,
      html: mail.html,
    });
  } catch (error) {
    if (!isHandedOver || isAnswer(error)) throw error;
    throw new UncertainDelivery("The connection broke before the mail server had answered.", { cause: error });
  }
}
