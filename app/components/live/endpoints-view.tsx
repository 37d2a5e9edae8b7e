import { Plus } from "lucide-react";
import { useEffect, useState } from "react";
import { Form } from "react-router";
import type { AllowanceSummary, EndpointSummary } from "~/presenters/endpoints-page.server";
import { StatusBadge } from "../notation/status-badge";
import { LocalTime } from "../shell/local-time";
import { Button, LinkButton } from "../ui/button";
import { Empty } from "../ui/empty";
import { Notice } from "../ui/notice";
import { Block, Page } from "../ui/page";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";
import { AllowedPlaces } from "./allowed-places";
import { EndpointForm, type DiscoveredServer } from "./endpoint-form";

export type EndpointsAnswer = { errors: readonly string[]; done?: string; discovery?: DiscoveredServer };

type Props = {
  endpoints: readonly EndpointSummary[];
  allowances: readonly AllowanceSummary[];
  isAdministrator: boolean;
  now: string;
  answer: EndpointsAnswer | undefined;
};

/** Servers other than our own test servers: named by the team, reached only where an administrator lets Ferrule go. */
export function EndpointsView({ endpoints, allowances, isAdministrator, now, answer }: Props) {
  const [isAdding, setAdding] = useState(false);
  useEffect(() => {
    if (answer?.done === "save") setAdding(false);
  }, [answer]);
  const isOpen = isAdding || answer?.discovery !== undefined;
  return (
    <Page
      title="Endpoints"
      about="OPC UA servers of the shop floor that the team may look at."
      actions={
        <>
          <LinkButton to="/live">Back to Live</LinkButton>
          {isOpen ? null : (
            <Button tone="main" icon={Plus} onClick={() => setAdding(true)}>
              Add an endpoint
            </Button>
          )}
        </>
      }
    >
      {answer && answer.errors.length > 0 ? <Notice tone="error" live title={answer.errors.join(" ")} className="mb-3" /> : null}
      {isOpen ? <EndpointForm discovery={answer?.done === "save" ? undefined : answer?.discovery} now={now} onClose={() => setAdding(false)} hasAllowances={allowances.length > 0} /> : null}
      {endpoints.length === 0 ? (
        isOpen ? null : (
          <Empty title="No endpoint yet">
            <p>Name a server by its address; Ferrule asks it what it offers, you compare its certificate and say who the session is for.</p>
          </Empty>
        )
      ) : (
        <EndpointTable endpoints={endpoints} now={now} />
      )}
      <AllowedPlaces allowances={allowances} isAdministrator={isAdministrator} />
    </Page>
  );
}

function EndpointTable({ endpoints, now }: { endpoints: readonly EndpointSummary[]; now: string }) {
  return (
    <Block title="Known servers" className="mb-8">
      <TableScroll label="Endpoints">
        <Table caption="Endpoints">
          <thead>
            <tr>
              <Th>Name</Th>
              <Th>Address</Th>
              <Th>Messages</Th>
              <Th>Session for</Th>
              <Th>Trusted certificate</Th>
              <Th>Last changed</Th>
              <Th>
                <span className="sr-only">Look or remove</span>
              </Th>
            </tr>
          </thead>
          <tbody>
            {endpoints.map((endpoint) => (
              <Tr key={endpoint.id}>
                <Td className="font-semibold">{endpoint.name}</Td>
                <Td mono>{endpoint.url}</Td>
                <Td>{endpoint.securityMode === "none" ? <StatusBadge status="uncertain">Unprotected</StatusBadge> : `${endpoint.securityMode === "sign" ? "signed" : "signed and encrypted"}, ${endpoint.securityPolicy}`}</Td>
                <Td>{endpoint.tokenKind === "anonymous" ? "nobody in particular" : (endpoint.userName ?? "a certificate")}</Td>
                <Td>{endpoint.trust ? <Trust trust={endpoint.trust} now={now} /> : "none"}</Td>
                <Td className="text-ink-2">
                  <LocalTime iso={endpoint.updatedAt} />, {endpoint.updatedBy}
                </Td>
                <Td right>
                  <span className="flex justify-end gap-2">
                    <Form method="post">
                      <input type="hidden" name="intent" value="remove" />
                      <input type="hidden" name="id" value={endpoint.id} />
                      <Button type="submit" size="small" aria-label={`Remove ${endpoint.name}`}>
                        Remove
                      </Button>
                    </Form>
                    {endpoint.isAllowed ? (
                      <LinkButton size="small" to={`/live/${endpoint.id}/learn`} aria-label={`Learn a model from ${endpoint.name}`}>
                        Learn
                      </LinkButton>
                    ) : null}
                    {endpoint.isAllowed ? (
                      <LinkButton size="small" tone="ink" to={`/live/${endpoint.id}`} aria-label={`Look at ${endpoint.name}`}>
                        Look
                      </LinkButton>
                    ) : (
                      <StatusBadge status="bad">not allowed</StatusBadge>
                    )}
                  </span>
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </Block>
  );
}

function Trust({ trust, now }: { trust: NonNullable<EndpointSummary["trust"]>; now: string }) {
  const isOver = trust.validTo < now;
  return (
    <span className="flex flex-wrap items-center gap-x-2">
      <span className="font-mono text-note" title={trust.fingerprint}>
        {trust.fingerprint.slice(0, 17)}…
      </span>
      <span className={isOver ? "text-error" : "text-ink-2"}>
        {isOver ? "expired " : "until "}
        {trust.validTo.slice(0, 10)}
      </span>
    </span>
  );
}
