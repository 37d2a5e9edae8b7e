import { useState } from "react";
import { Form, useNavigation } from "react-router";
import type { Discovery, OfferedEndpoint } from "~/domain/live/discovery";
import { Button } from "../ui/button";
import { Field, Input, Select } from "../ui/field";
import { Notice } from "../ui/notice";
import { Block } from "../ui/page";

export type DiscoveredServer = Discovery & { readonly url: string };

type Props = { discovery: DiscoveredServer | undefined; now: string; hasAllowances: boolean; onClose: () => void };

/** An endpoint in two steps: ask the server what it offers, then choose, compare its certificate, and name it. */
export function EndpointForm({ discovery, now, hasAllowances, onClose }: Props) {
  const busy = useNavigation().formData?.get("intent") === "discover";
  return (
    <Block title="A new endpoint" className="mb-8 max-w-240" actions={<Button onClick={onClose}>Close</Button>}>
      {hasAllowances ? null : <Notice tone="hint" title="No place is allowed yet: an administrator does that at the foot of this page." className="mb-3" />}
      <Form method="post" className="flex flex-wrap items-end gap-3">
        <input type="hidden" name="intent" value="discover" />
        <Field label="Address" className="w-96" hint="Asking needs no sign-in and changes nothing.">
          {(tied) => <Input {...tied} name="url" mono required defaultValue={discovery?.url} placeholder="opc.tcp://gateway-1:4840" autoComplete="off" autoFocus />}
        </Field>
        <Button type="submit" tone={discovery ? "plain" : "main"} busy={busy} className="mb-5">
          Ask the server
        </Button>
      </Form>
      {discovery ? <Offer key={discovery.url} discovery={discovery} now={now} /> : null}
    </Block>
  );
}

const TOKENS = { anonymous: "nobody in particular", "user-name": "a user name", certificate: "a certificate" } as const;

function Offer({ discovery, now }: { discovery: DiscoveredServer; now: string }) {
  const offers = discovery.endpoints.filter((offer) => offer.isKnown);
  const [chosen, setChosen] = useState(0);
  const offer = offers[chosen];
  const [token, setToken] = useState<OfferedEndpoint["tokens"][number]>(offer?.tokens.includes("user-name") ? "user-name" : (offer?.tokens[0] ?? "anonymous"));
  const [isCompared, setCompared] = useState(false);
  const saving = useNavigation().formData?.get("intent") === "save";
  if (!offer) return <Notice tone="error" title="The server offers no security policy that Ferrule speaks." className="mt-3" />;
  const needsTrust = offer.securityMode !== "none";
  const { certificate } = discovery;
  return (
    <Form method="post" className="mt-4 grid gap-4 border-t border-ink pt-3" aria-label="The server's offer">
      <input type="hidden" name="intent" value="save" />
      <input type="hidden" name="url" value={discovery.url} />
      <input type="hidden" name="securityMode" value={offer.securityMode} />
      <input type="hidden" name="securityPolicy" value={needsTrust ? offer.securityPolicy : "Basic256Sha256"} />
      {needsTrust && certificate ? <input type="hidden" name="serverCertificate" value={certificate.data} /> : null}
      <p className="text-body">
        <b className="font-semibold">{discovery.applicationName || "A server without a name"}</b> <span className="font-mono text-note text-ink-3">{discovery.applicationUri}</span>
      </p>
      <fieldset>
        <legend className="mb-1 text-note font-medium text-ink-2">Messages, the strongest first</legend>
        {offers.map((one, index) => (
          <label key={`${one.securityMode} ${one.securityPolicy}`} className="flex min-h-7 items-center gap-2 text-small">
            <input
              type="radio"
              name="offer"
              checked={index === chosen}
              onChange={() => {
                setChosen(index);
                if (!one.tokens.includes(token)) setToken(one.tokens[0] ?? "anonymous");
              }}
            />
            {one.securityMode === "none" ? "unprotected (bench use only; nothing can be written)" : `${one.securityMode === "sign" ? "signed" : "signed and encrypted"}, ${one.securityPolicy}`}
          </label>
        ))}
      </fieldset>
      {needsTrust ? <CertificateFacts certificate={certificate} now={now} isCompared={isCompared} onCompared={setCompared} /> : null}
      <div className="flex flex-wrap gap-3">
        <Field label="Name in Ferrule" className="w-64">
          {(tied) => <Input {...tied} name="name" required maxLength={100} placeholder="Gateway 1" autoComplete="off" />}
        </Field>
        <Field label="Session for" className="w-52">
          {(tied) => (
            <Select {...tied} name="tokenKind" value={token} onChange={(event) => setToken(event.target.value as typeof token)}>
              {offer.tokens.map((kind) => (
                <option key={kind} value={kind}>
                  {TOKENS[kind]}
                </option>
              ))}
            </Select>
          )}
        </Field>
        <TokenFields kind={token} />
      </div>
      <Field label="Note" optional className="max-w-160">
        {(tied) => <Input {...tied} name="note" maxLength={1000} />}
      </Field>
      <p>
        <Button type="submit" tone="main" busy={saving} blockedBy={needsTrust && !(certificate && isCompared) ? "Compare the certificate first" : undefined}>
          Save the endpoint
        </Button>
      </p>
    </Form>
  );
}

function TokenFields({ kind }: { kind: OfferedEndpoint["tokens"][number] }) {
  if (kind === "anonymous") return null;
  if (kind === "user-name") {
    return (
      <>
        <Field label="User name" className="w-48">
          {(tied) => <Input {...tied} name="userName" required autoComplete="off" />}
        </Field>
        <Field label="Password" className="w-48" hint="Kept encrypted; it never comes back to a browser.">
          {(tied) => <Input {...tied} name="secret" type="password" required autoComplete="new-password" />}
        </Field>
      </>
    );
  }
  return (
    <>
      <Field label="Certificate, DER in base64" className="w-72">
        {(tied) => <Input {...tied} name="userCertificate" mono required autoComplete="off" />}
      </Field>
      <Field label="Private key, PEM" className="w-72" hint="Kept encrypted; it never comes back to a browser.">
        {(tied) => <Input {...tied} name="secret" type="password" required autoComplete="off" />}
      </Field>
    </>
  );
}

type CertificateProps = { certificate: Discovery["certificate"]; now: string; isCompared: boolean; onCompared: (isCompared: boolean) => void };

function CertificateFacts({ certificate, now, isCompared, onCompared }: CertificateProps) {
  if (!certificate) return <Notice tone="error" title="The server shows no certificate that can be read; its messages cannot be protected." />;
  const isOver = certificate.validTo < now;
  return (
    <section aria-label="The server's certificate" className="max-w-200 border border-rule px-3 py-2">
      <dl className="grid grid-cols-[110px_1fr] gap-x-3 gap-y-1 text-small">
        <dt className="text-ink-3">Certificate of</dt>
        <dd>{certificate.subject}</dd>
        <dt className="text-ink-3">Signed by</dt>
        <dd>{certificate.isSelfSigned ? "itself" : certificate.issuer}</dd>
        <dt className="text-ink-3">Valid</dt>
        <dd className={isOver ? "text-error" : undefined}>
          {certificate.validFrom.slice(0, 10)} … {certificate.validTo.slice(0, 10)}
          {isOver ? ", expired: have the server’s owner renew it" : ""}
        </dd>
        <dt className="text-ink-3">SHA-256</dt>
        <dd className="font-mono text-note break-all">{certificate.fingerprint}</dd>
      </dl>
      <label className="mt-2 flex items-start gap-2 text-small">
        <input type="checkbox" checked={isCompared} onChange={(event) => onCompared(event.target.checked)} className="mt-0.5" />
        I have compared this fingerprint with the one that the server’s owner shows, and trust this server.
      </label>
    </section>
  );
}
