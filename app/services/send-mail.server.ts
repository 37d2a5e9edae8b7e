/** Sends what is due of the queue. A mail server that is away costs time, never a mail. */
import { createTransport, type Transporter } from "nodemailer";
import { writeBatch } from "../db/client.server";
import { claimMail, listDueMail, updateMailStatement, type MailRow } from "../db/repositories/outbox.server";
import { getEnvironment } from "../utils/env.server";
import { nextAttempt } from "../utils/next-attempt";
import { singleton } from "../utils/singleton.server";
import { getLocalMailPort } from "./local-mail-server.server";

const BATCH = 20;
/** While one is being sent no other process takes it. */
const CLAIM_MS = 120_000;
const TIMEOUT_MS = 20_000;

/** Answers how many were sent. Without a mail server all wait. */
export async function sendDueMail(now: Date): Promise<number> {
  const { smtpUrl } = getEnvironment();
  if (smtpUrl === undefined) return 0;
  let sent = 0;
  for (const mail of await listDueMail(now, BATCH)) {
    if (!(await claimMail(mail, new Date(now.getTime() + CLAIM_MS)))) continue;
    if (await send(mail, smtpUrl, now)) sent++;
  }
  return sent;
}

async function send(mail: MailRow, smtpUrl: string, now: Date): Promise<boolean> {
  try {
    const transport = await getTransport(smtpUrl);
    await transport.sendMail({
      from: getEnvironment().mailFrom,
      to: { name: mail.toName, address: mail.toAddress },
      subject: mail.subject,
      text: mail.text,
      html: mail.html,
      messageId: `<${mail.id}@ferrule>`,
      headers: {
        "X-Ferrule-Mail": mail.id,
        // RFC 8058: one press in the mail program is enough.
        "List-Unsubscribe": `<${mail.unsubscribeUrl}>`,
        "List-Unsubscribe-Post": "List-Unsubscribe=One-Click",
      },
    });
    await writeBatch([updateMailStatement(mail.id, { state: "sent", sentAt: new Date(), attempts: mail.attempts + 1, lastError: null })]);
    return true;
  } catch (error) {
    const attempts = mail.attempts + 1;
    const next = isFinal(error) ? undefined : nextAttempt(attempts, now);
    const lastError = (error instanceof Error ? error.message : String(error)).slice(0, 500);
    await writeBatch([
      updateMailStatement(mail.id, next ? { attempts, lastError, nextAttemptAt: next } : { attempts, lastError, state: "failed" }),
    ]);
    return false;
  }
}

/** 5yz is a permanent negative answer (RFC 5321 §4.2.1), but one to the sign-in or greeting is about us, not the mail. */
function isFinal(error: unknown): boolean {
  const { responseCode, command } = error as { responseCode?: number; command?: string };
  return responseCode !== undefined && responseCode >= 500 && (command === "RCPT TO" || command === "DATA");
}

const getTransports = () => singleton("mail-transports", () => new Map<string, Transporter>());

async function getTransport(smtpUrl: string): Promise<Transporter> {
  const transports = getTransports();
  const known = transports.get(smtpUrl);
  if (known) return known;
  const limits = { connectionTimeout: TIMEOUT_MS, greetingTimeout: TIMEOUT_MS, socketTimeout: TIMEOUT_MS };
  const transport =
    smtpUrl === "local"
      ? createTransport({ host: "127.0.0.1", port: await getLocalMailPort(), secure: false, ignoreTLS: true, ...limits })
      : createTransport({ url: smtpUrl, ...limits });
  transports.set(smtpUrl, transport);
  return transport;
}
