import { Form, useFetcher, useNavigation } from "react-router";
import { StatusBadge } from "~/components/notation/status-badge";
import { LocalTime } from "~/components/shell/local-time";
import { Button, LinkButton } from "~/components/ui/button";
import { Checkbox, Field, Input } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { SettingsPage, WebhookLine } from "~/services/read-outbox.server";
import { mailKinds, type MailKind } from "~/utils/mail-kinds";

type Props = { page: SettingsPage; mayAdminister: boolean; errors: readonly string[]; secret: string | undefined };

/** What the organisation asks of its releases, whom it tells of them, and which mails one wants oneself. */
export function SettingsView({ page, mayAdminister, errors, secret }: Props) {
  const busy = useNavigation().formData?.get("intent");
  return (
    <Page
      title="Approvals, webhooks, mail"
      actions={
        <>
          <LinkButton to="/team">Team</LinkButton>
          {mayAdminister ? <LinkButton to="/team/outbox">Outbox</LinkButton> : null}
        </>
      }
    >
      <div className="grid max-w-240 gap-8">
        {errors.length > 0 ? <Notice tone="error" title={errors.join(" ")} live /> : null}
        <Block title="Approvals" about="that a release needs, from people who made none of the change">
          <Form method="post" className="flex items-end gap-3" key={page.approvals}>
            <input type="hidden" name="intent" value="approvals" />
            <Field label="Approvals" className="w-24">
              {(control) => (
                <Input
                  {...control}
                  name="approvals"
                  type="number"
                  min={1}
                  max={5}
                  defaultValue={page.approvals}
                  mono
                  disabled={!mayAdminister}
                />
              )}
            </Field>
            <Button
              type="submit"
              busy={busy === "approvals"}
              blockedBy={mayAdminister ? undefined : "asks for the role administrator"}
            >
              Save
            </Button>
          </Form>
        </Block>
        <Block title="Signing key" about="Ed25519; its private half never leaves this installation">
          {page.key ? (
            <p className="border-t border-ink py-2 text-small">
              <span className="font-mono break-all">{page.key.id}</span>, since{" "}
              <LocalTime iso={page.key.createdAt} parts="date" />.{" "}
              <a
                href="/api/v1/signing-key"
                download="ferrule-key.pem"
                className="underline decoration-rule underline-offset-3 hover:text-copper"
              >
                Download the public key
              </a>
            </p>
          ) : (
            <p className="border-t border-ink py-2 text-small text-ink-2">It is made with the first release.</p>
          )}
        </Block>
        <Block title="Mails to me">
          <div className="grid gap-2 border-t border-ink pt-2">
            {(Object.keys(mailKinds) as MailKind[]).map((kind) => (
              <MailChoice key={kind} kind={kind} isWanted={!page.refusals.includes(kind)} />
            ))}
          </div>
        </Block>
        {mayAdminister ? (
          <WebhooksBlock webhooks={page.webhooks} secret={secret} busy={busy === "add-webhook"} />
        ) : null}
      </div>
    </Page>
  );
}

function MailChoice({ kind, isWanted }: { kind: MailKind; isWanted: boolean }) {
  const fetcher = useFetcher();
  const shown = fetcher.formData ? fetcher.formData.get("wanted") !== null : isWanted;
  return (
    <fetcher.Form method="post">
      <input type="hidden" name="intent" value="mail" />
      <input type="hidden" name="kind" value={kind} />
      <Checkbox
        name="wanted"
        label={`When ${mailKinds[kind]}`}
        checked={shown}
        onChange={(event) => void fetcher.submit(event.currentTarget.form)}
      />
    </fetcher.Form>
  );
}

function WebhooksBlock({
  webhooks,
  secret,
  busy,
}: {
  webhooks: readonly WebhookLine[];
  secret: string | undefined;
  busy: boolean;
}) {
  return (
    <Block
      title="Webhooks"
      about="a signed POST for each release that is published or withdrawn, tried again until it is taken"
    >
      {secret ? (
        <Notice tone="good" title="Copy the secret now; it is never shown again" live className="mb-3">
          <code className="font-mono text-small break-all select-all">{secret}</code>
        </Notice>
      ) : null}
      {webhooks.length === 0 ? <p className="border-t border-ink py-2 text-small text-ink-2">None yet.</p> : null}
      {webhooks.map((hook) => (
        <section key={hook.id} aria-label={hook.url} className="mb-4 border-t border-ink pt-2">
          <div className="flex items-center gap-3">
            <h3 className="min-w-0 flex-1 truncate font-mono text-small font-semibold">{hook.url}</h3>
            <span className="text-note text-ink-3">by {hook.createdBy}</span>
            <Form method="post">
              <input type="hidden" name="intent" value="remove-webhook" />
              <input type="hidden" name="webhookId" value={hook.id} />
              <Button type="submit" size="small" tone="bare">
                Remove
              </Button>
            </Form>
          </div>
          {hook.deliveries.length > 0 ? (
            <CallTable hook={hook} />
          ) : (
            <p className="text-small text-ink-3">Not called yet.</p>
          )}
        </section>
      ))}
      <Form method="post" className="mt-2 flex items-end gap-3" key={webhooks.length}>
        <input type="hidden" name="intent" value="add-webhook" />
        <Field label="Address" className="flex-1">
          {(control) => (
            <Input
              {...control}
              name="url"
              type="url"
              mono
              required
              maxLength={1000}
              placeholder="https://pipeline.example/hooks/ferrule"
            />
          )}
        </Field>
        <Button type="submit" busy={busy}>
          Add a webhook
        </Button>
      </Form>
    </Block>
  );
}

const statuses = { waiting: "stale", sent: "good", failed: "bad" } as const;

function CallTable({ hook }: { hook: WebhookLine }) {
  return (
    <TableScroll label={`Calls of ${hook.url}`}>
      <Table caption={`Calls of ${hook.url}, newest first`}>
        <thead>
          <tr>
            <Th>Event</Th>
            <Th>When</Th>
            <Th>State</Th>
            <Th right>Attempts</Th>
            <Th>Answer</Th>
          </tr>
        </thead>
        <tbody>
          {hook.deliveries.map((call) => (
            <Tr key={call.id}>
              <RowHead className="font-mono font-normal">{call.event}</RowHead>
              <Td>
                <LocalTime iso={call.createdAt} />
              </Td>
              <Td>
                <StatusBadge status={statuses[call.state]}>{call.state === "sent" ? "taken" : call.state}</StatusBadge>
              </Td>
              <Td right mono>
                {call.attempts}
              </Td>
              <Td mono className="text-note">
                {call.lastStatus ?? call.lastError ?? "–"}
              </Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}
