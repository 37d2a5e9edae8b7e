/**
 * Mails are rows of the queue, written in the batch of the act that they tell of, so that neither exists without the other;
 * `run-outbox.server.ts` sends them when a mail server takes them.
 */
import type { Statement } from "../db/client.server";
import { addMailStatement, listRefusing } from "../db/repositories/outbox.server";
import { html, makePage } from "../domain/release/html";
import { getEnvironment } from "../utils/env.server";
import { newId } from "../utils/ids.server";
import type { MailKind } from "../utils/mail-kinds";
import { makeMark } from "../utils/seal.server";

export type Addressee = { readonly id: string; readonly name: string; readonly email: string };

export type MailContent = {
  readonly subject: string;
  /** Paragraphs of plain sentences. */
  readonly paragraphs: readonly string[];
  readonly link: { readonly text: string; readonly path: string };
};

export const UNSUBSCRIBE_PURPOSE = "unsubscribe";

/** Statements for the batch; nothing for those who refuse the kind. */
export async function listMailStatements(
  organizationId: string,
  kind: MailKind,
  addressees: readonly Addressee[],
  content: MailContent,
): Promise<Statement[]> {
  const refusing = await listRefusing(addressees.map((person) => person.id), kind);
  const now = new Date();
  const wanted = new Map(addressees.filter((person) => !refusing.has(person.id)).map((person) => [person.id, person]));
  return [...wanted.values()].map((person) => {
    const unsubscribeUrl = toUrl(`/mail/unsubscribe?${new URLSearchParams({ user: person.id, kind, mark: makeMark(`${person.id} ${kind}`, UNSUBSCRIBE_PURPOSE) }).toString()}`);
    return addMailStatement({
      id: newId(),
      organizationId,
      kind,
      toAddress: person.email,
      toName: person.name,
      subject: content.subject.replace(/[\r\n]+/g, " ").slice(0, 200),
      ...writeBodies(person, content, unsubscribeUrl),
      unsubscribeUrl,
      state: "waiting",
      attempts: 0,
      nextAttemptAt: now,
      createdAt: now,
    });
  });
}

/** The address of a page as a browser elsewhere writes it. */
export function toUrl(path: string): string {
  const { publicOrigin, host, port } = getEnvironment();
  return `${publicOrigin ?? `http://${host.includes(":") ? `[${host}]` : host}:${port}`}${path}`;
}

function writeBodies(person: Addressee, { subject, paragraphs, link }: MailContent, unsubscribeUrl: string): { text: string; html: string } {
  const url = toUrl(link.path);
  const greeting = `Hello ${person.name},`;
  const farewell = "Mails of this kind can be stopped:";
  const text = [greeting, ...paragraphs, `${link.text}: ${url}`, `--\n${farewell} ${unsubscribeUrl}`].join("\n\n");
  const body = html`<p>${greeting}</p>${paragraphs.map((paragraph) => html`<p>${paragraph}</p>`)}<p><a href="${url}">${link.text}</a></p><hr><p class="dim">${farewell} <a href="${unsubscribeUrl}">stop them</a></p>`;
  return { text, html: makePage("en", subject, body) };
}
