import { Download, FileText, ShieldCheck } from "lucide-react";
import { Form, Link, useFetcher, useNavigation } from "react-router";
import { RatingBadge } from "~/components/notation/difference-badge";
import { StatusBadge } from "~/components/notation/status-badge";
import { LocalTime } from "~/components/shell/local-time";
import { Button, buttonClass, TextLink } from "~/components/ui/button";
import { Dialog, DialogClose } from "~/components/ui/dialog";
import { Field, Input, Select, TextArea } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import type { DeliveryLine, ReleasePage } from "~/services/read-release.server";
import { formatCount } from "~/utils/format";

type Props = { page: ReleasePage; errors: readonly string[] };

/** One release: what it is made of, who vouches for it, and where it went. */
export function ReleaseView({ page, errors }: Props) {
  const { release, review, previous } = page;
  return (
    <Page
      title={
        <>
          {release.model} <span className="font-mono">{release.version}</span>
        </>
      }
      about={
        release.withdrawn ? (
          <Tag tone="ink">withdrawn</Tag>
        ) : release.rating ? (
          <RatingBadge rating={release.rating} />
        ) : null
      }
      actions={
        <>
          {page.mayRelease && !release.withdrawn ? <WithdrawDialog /> : null}
          <a href={`/api/v1/releases/${release.id}/bundle`} download className={buttonClass("main")}>
            <Icon of={Download} /> Bundle
          </a>
        </>
      }
    >
      <div className="grid gap-8">
        {errors.length > 0 ? <Notice tone="error" title={errors.join(" ")} live /> : null}
        {release.withdrawn ? (
          <Notice tone="warning" title={`Withdrawn by ${release.withdrawn.by}`}>
            {release.withdrawn.reason} (<LocalTime iso={release.withdrawn.at} />)
          </Notice>
        ) : null}
        <dl className="grid grid-cols-[150px_minmax(0,1fr)] gap-y-1 border-t border-ink pt-2 text-small">
          <Fact name="SHA-256 of the bundle">
            <span className="font-mono break-all">{release.bundleHash}</span>
          </Fact>
          <Fact name="Namespace">
            <span className="font-mono">{page.namespaceUri}</span>
          </Fact>
          <Fact name="ModelVersion">
            <span className="font-mono">{release.modelVersion}</span>
          </Fact>
          <Fact name="Publication date">
            <span className="font-mono">{release.publicationDate}</span>
          </Fact>
          <Fact name="Revision">
            <TextLink to={`/models/${release.modelId}/revisions`}>{release.revision}</TextLink>
          </Fact>
          <Fact name="Released by">
            {release.by}, <LocalTime iso={release.at} />
          </Fact>
          {review ? (
            <Fact name="Review">
              <TextLink to={`/reviews/${review.id}`}>
                {review.number} {review.title}
              </TextLink>
            </Fact>
          ) : null}
          {previous ? (
            <Fact name="Release before">
              <TextLink to={`/releases/${previous.id}`}>{previous.version}</TextLink>
            </Fact>
          ) : null}
          {page.notes === "" ? null : <Fact name="Notes">{page.notes}</Fact>}
        </dl>
        <DeliveriesBlock page={page} />
        <FilesBlock page={page} />
        <RequiredBlock page={page} />
        <SignatureBlock page={page} />
      </div>
    </Page>
  );
}

function Fact({ name, children }: { name: string; children: React.ReactNode }) {
  return (
    <>
      <dt className="text-ink-3">{name}</dt>
      <dd>{children}</dd>
    </>
  );
}

function FilesBlock({ page }: { page: ReleasePage }) {
  const { release, files } = page;
  const open = (path: string) => `/releases/${release.id}/file?path=${encodeURIComponent(path)}`;
  return (
    <Block
      title="Files"
      about={`${formatCount(files.length)} in ${release.fileName}, ${formatCount(Math.ceil(release.bundleSize / 1024))} kB`}
    >
      <TableScroll label="Files of the bundle">
        <Table caption="Files of the bundle with their hashes">
          <thead>
            <tr>
              <Th>File</Th>
              <Th right>Bytes</Th>
              <Th>SHA-256</Th>
            </tr>
          </thead>
          <tbody>
            {files.map((file) => (
              <Tr key={file.path}>
                <RowHead>
                  <a
                    href={open(file.path)}
                    className="inline-flex items-center gap-1.5 hover:text-copper"
                    {...(file.path.endsWith(".html") ? { target: "_blank", rel: "noreferrer" } : { download: true })}
                  >
                    <Icon of={FileText} /> {file.path}
                  </a>
                </RowHead>
                <Td right mono>
                  {formatCount(file.size)}
                </Td>
                <Td mono className="text-note break-all text-ink-2">
                  {file.sha256}
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </Block>
  );
}

function RequiredBlock({ page }: { page: ReleasePage }) {
  return (
    <Block title="Stands on" about="exactly these">
      <TableScroll label="Required models">
        <Table caption="Required models that the release pins">
          <thead>
            <tr>
              <Th>Model</Th>
              <Th>Version</Th>
              <Th>Published</Th>
              <Th>SHA-256</Th>
            </tr>
          </thead>
          <tbody>
            {page.required.map((row) => (
              <Tr key={row.modelUri}>
                <RowHead className="font-mono font-normal">{row.modelUri}</RowHead>
                <Td mono>{row.version ?? "–"}</Td>
                <Td mono className="text-note">
                  {row.publicationDate ?? "–"}
                </Td>
                <Td mono className="text-note text-ink-2" title={row.sha256}>
                  {row.sha256.slice(0, 16)}…
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </Block>
  );
}

function SignatureBlock({ page }: { page: ReleasePage }) {
  const { release, key } = page;
  const fetcher = useFetcher<{ rebuilt: string }>();
  const rebuilt = fetcher.data?.rebuilt;
  return (
    <Block
      title="Signature"
      about="Ed25519, by the organisation’s key"
      actions={
        <fetcher.Form method="post">
          <input type="hidden" name="intent" value="rebuild" />
          <Button type="submit" icon={ShieldCheck} busy={fetcher.state !== "idle"}>
            Build it again and compare
          </Button>
        </fetcher.Form>
      }
    >
      {rebuilt === undefined ? null : (
        <Notice
          live
          tone={rebuilt === release.bundleHash ? "good" : "error"}
          title={
            rebuilt === release.bundleHash ? "Built again from its revision: the same bytes" : "Built again, it differs"
          }
          className="mb-2"
        >
          <span className="font-mono text-note break-all">{rebuilt}</span>
        </Notice>
      )}
      <dl className="grid grid-cols-[150px_minmax(0,1fr)] gap-y-1 border-t border-ink pt-2 text-small">
        <Fact name="Key">
          <span className="font-mono break-all">{key.id}</span>
        </Fact>
        <Fact name="Public key">
          <a
            href="/api/v1/signing-key"
            download="ferrule-key.pem"
            className="underline decoration-rule underline-offset-3 hover:text-copper"
          >
            ferrule-key.pem
          </a>
        </Fact>
        <Fact name="To verify">
          <code className="font-mono text-note">
            npm run -s ferrule -- verify {release.fileName} --key ferrule-key.pem
          </code>
        </Fact>
      </dl>
    </Block>
  );
}

const deliveryStatus = {
  sent: ["stale", "sent"],
  loaded: ["uncertain", "loaded"],
  proved: ["good", "proved"],
} as const;

function DeliveriesBlock({ page }: { page: ReleasePage }) {
  const { deliveries, gateways, release } = page;
  const busy = useNavigation().formData?.get("intent") === "deliver";
  return (
    <Block title="Deliveries" about="handed to gateways; proved by an as-built report">
      {deliveries.length === 0 ? (
        <p className="border-t border-ink py-2 text-small text-ink-2">Not handed to a gateway yet.</p>
      ) : (
        <TableScroll label="Deliveries">
          <Table caption="Deliveries of this release">
            <thead>
              <tr>
                <Th>Gateway</Th>
                <Th>State</Th>
                <Th>Sent</Th>
                <Th>Loaded</Th>
                <Th>Proved</Th>
                <Th>SHA-256</Th>
                <Th>Note</Th>
                <Th>
                  <span className="sr-only">Next step</span>
                </Th>
              </tr>
            </thead>
            <tbody>
              {deliveries.map((delivery) => (
                <DeliveryRow key={delivery.id} delivery={delivery} mayRelease={page.mayRelease} />
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
      {page.mayRelease && !release.withdrawn ? (
        gateways.length === 0 ? (
          <p className="mt-2 text-small text-ink-2">
            Name a gateway first, under{" "}
            <Link to="/sources" className="underline">
              Sources
            </Link>
            .
          </p>
        ) : (
          <Form method="post" className="mt-3 flex flex-wrap items-end gap-3" key={deliveries.length}>
            <input type="hidden" name="intent" value="deliver" />
            <Field label="Gateway" className="w-48">
              {(control) => (
                <Select {...control} name="gatewayId">
                  {gateways.map((gateway) => (
                    <option key={gateway.id} value={gateway.id}>
                      {gateway.name}
                    </option>
                  ))}
                </Select>
              )}
            </Field>
            <Field label="Note" optional className="w-72">
              {(control) => <Input {...control} name="note" maxLength={1000} placeholder="by USB stick, order 4711" />}
            </Field>
            <Button type="submit" busy={busy}>
              Note the delivery
            </Button>
          </Form>
        )
      ) : null}
    </Block>
  );
}

function DeliveryRow({ delivery, mayRelease }: { delivery: DeliveryLine; mayRelease: boolean }) {
  const [status, word] = deliveryStatus[delivery.state];
  return (
    <Tr>
      <RowHead>{delivery.gateway}</RowHead>
      <Td>
        <StatusBadge status={status}>{word}</StatusBadge>
      </Td>
      {[delivery.sent, delivery.loaded, delivery.proved].map((act, i) => (
        <Td key={i} className="whitespace-nowrap">
          {act ? (
            <>
              {act.by}, <LocalTime iso={act.at} />
            </>
          ) : (
            <span className="text-ink-3">–</span>
          )}
        </Td>
      ))}
      <Td mono className="text-note text-ink-2" title={delivery.hash}>
        {delivery.hash.slice(0, 12)}…
      </Td>
      <Td>{delivery.note}</Td>
      <Td right>
        {delivery.state === "sent" && mayRelease ? (
          <Form method="post">
            <input type="hidden" name="intent" value="loaded" />
            <input type="hidden" name="deliveryId" value={delivery.id} />
            <Button type="submit" size="small">
              It is loaded
            </Button>
          </Form>
        ) : null}
      </Td>
    </Tr>
  );
}

function WithdrawDialog() {
  return (
    <Dialog
      title="Withdraw this release?"
      about="It stays visible as withdrawn, with your reason; everybody gets a mail. Gateways keep what they have loaded."
      trigger={<Button>Withdraw …</Button>}
    >
      <Form method="post" className="grid gap-3">
        <input type="hidden" name="intent" value="withdraw" />
        <TextArea name="reason" aria-label="Reason" placeholder="Reason" required maxLength={1000} rows={3} />
        <div className="flex justify-end gap-2">
          <DialogClose asChild>
            <Button>Keep it</Button>
          </DialogClose>
          <Button type="submit" tone="danger">
            Withdraw
          </Button>
        </div>
      </Form>
    </Dialog>
  );
}
