import { Copy } from "lucide-react";
import { useState } from "react";
import { Form, useNavigation } from "react-router";
import { LocalTime } from "~/components/shell/local-time";
import { Button } from "~/components/ui/button";
import { Dialog, DialogClose } from "~/components/ui/dialog";
import { Checkbox, Field, Input } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { Block } from "~/components/ui/page";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { TokenSummary } from "~/services/manage-tokens.server";

type Props = { tokens: readonly TokenSummary[]; secret: string | undefined; errors: readonly string[]; now: string };

export function TokensBlock({ tokens, secret, errors, now }: Props) {
  const busy = useNavigation().formData?.get("intent") === "create-token";
  return (
    <Block title="API tokens" about="for programs that read or write over /api/v1 in your name">
      {secret ? <NewSecret secret={secret} /> : null}
      {errors.length > 0 ? <Notice tone="error" title={errors.join(" ")} live className="mb-3" /> : null}
      {tokens.length === 0 ? (
        <p className="border-t border-ink py-2 text-small text-ink-2">No token yet.</p>
      ) : (
        <TableScroll label="API tokens">
          <Table caption="API tokens">
            <thead>
              <tr>
                <Th>For</Th>
                <Th>Begins with</Th>
                <Th>Owner</Th>
                <Th>May</Th>
                <Th>Ends</Th>
                <Th>Last used</Th>
                <Th>
                  <span className="sr-only">End it</span>
                </Th>
              </tr>
            </thead>
            <tbody>
              {tokens.map((token) => (
                <Tr key={token.id}>
                  <Td className="font-semibold">{token.name}</Td>
                  <Td mono className="text-ink-2">
                    {token.hint}…
                  </Td>
                  <Td>{token.owner}</Td>
                  <Td>{token.scopes.join(", ")}</Td>
                  <Td mono>
                    {token.expiresAt ? <Expiry iso={token.expiresAt} hasExpired={token.expiresAt <= now} /> : "never"}
                  </Td>
                  <Td mono className="text-ink-2">
                    {token.lastUsedAt ? <LocalTime iso={token.lastUsedAt} /> : "never"}
                  </Td>
                  <Td right>
                    <RevokeToken token={token} />
                  </Td>
                </Tr>
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
      <Form method="post" className="mt-3 flex flex-wrap items-end gap-3" key={tokens.length}>
        <input type="hidden" name="intent" value="create-token" />
        <Field label="For" className="w-56">
          {(tied) => <Input {...tied} name="name" placeholder="nightly check" maxLength={100} required />}
        </Field>
        <fieldset className="flex h-7 items-center gap-3">
          <legend className="text-note font-medium text-ink-2">May read, and</legend>
          {(["write", "review", "release"] as const).map((scope) => (
            <Checkbox key={scope} name="scopes" value={scope} label={scope} />
          ))}
        </fieldset>
        <Field label="Ends after" className="w-28">
          {(tied) => (
            <Input {...tied} name="days" type="number" min={1} max={366} defaultValue={90} unit="days" mono required />
          )}
        </Field>
        <Button type="submit" busy={busy}>
          Make a token
        </Button>
      </Form>
    </Block>
  );
}

function Expiry({ iso, hasExpired }: { iso: string; hasExpired: boolean }) {
  return hasExpired ? (
    <span className="text-bad">
      ended <LocalTime iso={iso} parts="date" />
    </span>
  ) : (
    <LocalTime iso={iso} parts="date" />
  );
}

function NewSecret({ secret }: { secret: string }) {
  const [copied, setCopied] = useState(false);
  return (
    <Notice tone="good" title="Copy the token now; it is never shown again" live className="mb-3">
      <span className="mt-1.5 flex flex-wrap items-center gap-2">
        <code className="border border-rule bg-leaf px-2 py-1 font-mono text-small break-all select-all">{secret}</code>
        <Button
          size="small"
          icon={Copy}
          onClick={() => void navigator.clipboard.writeText(secret).then(() => setCopied(true))}
        >
          {copied ? "Copied" : "Copy"}
        </Button>
      </span>
    </Notice>
  );
}

function RevokeToken({ token }: { token: TokenSummary }) {
  return (
    <Dialog
      title="End this token?"
      about={`Programs that use “${token.name}” are refused at once.`}
      trigger={
        <Button size="small" tone="bare">
          End
        </Button>
      }
    >
      <Form method="post" className="flex justify-end gap-2">
        <input type="hidden" name="intent" value="revoke-token" />
        <input type="hidden" name="tokenId" value={token.id} />
        <DialogClose asChild>
          <Button>Keep it</Button>
        </DialogClose>
        <Button type="submit" tone="danger">
          End it
        </Button>
      </Form>
    </Dialog>
  );
}
