/**
 * A mail server of our own on this host, for the demo, development and tests: it takes every mail, delivers none and
 * shows what it took. It speaks SMTP on a free port of 127.0.0.1, so that sending is tried whole.
 */
import type { AddressInfo } from "node:net";
import { SMTPServer } from "smtp-server";
import { logError } from "../utils/log.server";
import { onShutdown } from "../utils/shutdown.server";
import { singleton } from "../utils/singleton.server";

export type ReceivedMail = {
  readonly at: string;
  readonly from: string;
  readonly to: readonly string[];
  /** The row of the queue that it was, by the header that sending adds. */
  readonly mailId: string | null;
  readonly source: string;
};

const MAX_KEPT = 200;
const MAX_BYTES = 1_000_000;

type Local = { readonly port: Promise<number>; readonly received: ReceivedMail[] };

const getLocal = (): Local => singleton("local-mail-server", startLocal);

/** The port; the server starts when it is first asked for. */
export function getLocalMailPort(): Promise<number> {
  return getLocal().port;
}

/** Newest first. */
export function listReceivedMail(): readonly ReceivedMail[] {
  return [...getLocal().received].reverse();
}

function startLocal(): Local {
  const received: ReceivedMail[] = [];
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ["AUTH", "STARTTLS"],
    disableReverseLookup: true,
    size: MAX_BYTES,
    onData(stream, session, done) {
      const chunks: Buffer[] = [];
      stream.on("data", (chunk: Buffer) => chunks.push(chunk));
      stream.on("end", () => {
        const source = Buffer.concat(chunks).toString("utf8");
        const { mailFrom, rcptTo } = session.envelope;
        received.push({
          at: new Date().toISOString(),
          from: mailFrom ? mailFrom.address : "",
          to: rcptTo.map((recipient) => recipient.address),
          mailId: /^x-ferrule-mail: ([\w-]{1,64})\s*$/im.exec(source)?.[1] ?? null,
          source,
        });
        received.splice(0, Math.max(0, received.length - MAX_KEPT));
        done();
      });
    },
  });
  server.on("error", (error: Error) => logError(error, "local mail server"));
  const port = new Promise<number>((resolve, reject) => {
    server.server.once("error", reject);
    server.listen(0, "127.0.0.1", () => resolve((server.server.address() as AddressInfo).port));
  });
  onShutdown("local mail server", () => new Promise<void>((resolve) => server.close(() => resolve())));
  return { port, received };
}
