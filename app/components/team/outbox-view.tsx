import { useState } from "react";
import { Form } from "react-router";
import { StatusBadge } from "~/components/notation/status-badge";
import { LocalTime } from "~/components/shell/local-time";
import { Button, LinkButton } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Notice } from "~/components/ui/notice";
import { Page } from "~/components/ui/page";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { MailLine, OutboxPage } from "~/services/read-outbox.server";

const statuses = { waiting: "stale", sent: "good", failed: "bad" } as const;

/** Every mail that leaves the house, and what became of it. */
export function OutboxView({ page }: { page: OutboxPage }) {
  const [open, setOpen] = useState<string>();
  const shown = page.mail.find((mail) => mail.id === open);
  return (
    <Page
      title="Outbox"
      about={<>from {page.from}</>}
      actions={<LinkButton to="/team/settings">Approvals, webhooks, mail</LinkButton>}
    >
      <div className="grid gap-4">
        {page.server === null ? (
          <Notice tone="warning" title="No mail server is set">
            Mails wait in the queue until FERRULE_SMTP_URL names one; nothing is lost.
          </Notice>
        ) : page.server === "local" ? (
          <Notice title="The mail server of this host takes every mail and delivers none">
            What it received is shown below.
          </Notice>
        ) : null}
        {page.mail.length === 0 ? (
          <Empty title="No mail yet">Asking for a review sends the first one.</Empty>
        ) : (
          <TableScroll label="Outbox">
            <Table caption="Mails, newest first">
              <thead>
                <tr>
                  <Th>Subject</Th>
                  <Th>To</Th>
                  <Th>Kind</Th>
                  <Th>State</Th>
                  <Th right>Attempts</Th>
                  <Th>Written</Th>
                  <Th>Received here</Th>
                  <Th>
                    <span className="sr-only">Again</span>
                  </Th>
                </tr>
              </thead>
              <tbody>
                {page.mail.map((mail) => (
                  <Tr key={mail.id}>
                    <Td className="font-semibold">
                      <button
                        type="button"
                        className="text-left hover:text-copper"
                        aria-expanded={open === mail.id}
                        onClick={() => setOpen(open === mail.id ? undefined : mail.id)}
                      >
                        {mail.subject}
                      </button>
                    </Td>
                    <Td>{mail.to}</Td>
                    <Td className="text-ink-2">{mail.kind}</Td>
                    <Td title={mail.lastError ?? undefined}>
                      <StatusBadge status={statuses[mail.state]}>{mail.state}</StatusBadge>
                    </Td>
                    <Td right mono>
                      {mail.attempts}
                    </Td>
                    <Td className="whitespace-nowrap">
                      <LocalTime iso={mail.createdAt} />
                    </Td>
                    <Td className="whitespace-nowrap">
                      {mail.received ? <LocalTime iso={mail.received.at} /> : <span className="text-ink-3">–</span>}
                    </Td>
                    <Td right>
                      {mail.state === "failed" ? (
                        <Form method="post">
                          <input type="hidden" name="id" value={mail.id} />
                          <Button type="submit" size="small">
                            Send again
                          </Button>
                        </Form>
                      ) : null}
                    </Td>
                  </Tr>
                ))}
              </tbody>
            </Table>
          </TableScroll>
        )}
        {shown ? <MailParts mail={shown} /> : null}
      </div>
    </Page>
  );
}

function MailParts({ mail }: { mail: MailLine }) {
  return (
    <section
      aria-label={mail.subject}
      className="grid grid-cols-2 gap-4 border-t-[1.5px] border-ink pt-3 max-lg:grid-cols-1"
    >
      {mail.lastError ? <Notice tone="error" title={mail.lastError} className="col-span-full" /> : null}
      <div>
        <h2 className="text-small font-semibold">Plain text</h2>
        <pre
          tabIndex={0}
          className="mt-1 max-h-80 overflow-auto border border-rule bg-leaf p-3 font-mono text-note whitespace-pre-wrap"
        >
          {mail.text}
        </pre>
      </div>
      <div>
        <h2 className="text-small font-semibold">HTML</h2>
        <iframe
          title={`HTML of ${mail.subject}`}
          sandbox=""
          srcDoc={mail.html}
          className="mt-1 h-80 w-full border border-rule bg-white"
        />
      </div>
      {mail.received ? (
        <div className="col-span-full">
          <h2 className="text-small font-semibold">As received by the mail server of this host</h2>
          <pre
            tabIndex={0}
            className="mt-1 max-h-80 overflow-auto border border-rule bg-leaf p-3 font-mono text-note whitespace-pre-wrap"
          >
            {mail.received.source}
          </pre>
        </div>
      ) : null}
    </section>
  );
}
