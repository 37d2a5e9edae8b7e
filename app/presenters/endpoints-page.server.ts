import { X509Certificate } from "node:crypto";
import { listAllowances, listEndpoints, type EndpointRow } from "../db/repositories/endpoints.server";
import { isAllowed, parseEndpointUrl } from "../domain/live/endpoint-address";

export type EndpointSummary = {
  readonly id: string;
  readonly name: string;
  readonly url: string;
  readonly securityMode: string;
  readonly securityPolicy: string;
  readonly tokenKind: string;
  readonly userName: string | null;
  /** SHA-256 of the trusted certificate, and the day it ends; null where none is trusted. */
  readonly trust: { readonly fingerprint: string; readonly validTo: string } | null;
  /** Whether the allow-list still covers the address. */
  readonly isAllowed: boolean;
  readonly note: string;
  readonly updatedBy: string;
  readonly updatedAt: string;
};

export type AllowanceSummary = { readonly id: string; readonly host: string; readonly portFrom: number; readonly portTo: number; readonly note: string; readonly addedBy: string; readonly addedAt: string };

export type EndpointsPage = { readonly endpoints: readonly EndpointSummary[]; readonly allowances: readonly AllowanceSummary[] };

/** The endpoints without their secrets, and the places that may be reached. */
export async function readEndpointsPage(organizationId: string): Promise<EndpointsPage> {
  const [rows, allowances] = await Promise.all([listEndpoints(organizationId), listAllowances(organizationId)]);
  return {
    endpoints: rows.map((row) => {
      const address = parseEndpointUrl(row.url);
      return { ...describe(row), isAllowed: address.ok && isAllowed(address.value, allowances) };
    }),
    allowances: allowances.map(({ id, host, portFrom, portTo, note, addedBy, addedAt }) => ({ id, host, portFrom, portTo, note, addedBy, addedAt: addedAt.toISOString() })),
  };
}

function describe({ id, name, url, securityMode, securityPolicy, tokenKind, userName, serverCertificate, note, updatedBy, updatedAt }: EndpointRow) {
  return { id, name, url, securityMode, securityPolicy, tokenKind, userName, trust: describeTrust(serverCertificate), note, updatedBy, updatedAt: updatedAt.toISOString() };
}

function describeTrust(base64: string | null): EndpointSummary["trust"] {
  if (base64 === null) return null;
  try {
    const certificate = new X509Certificate(Buffer.from(base64, "base64"));
    return { fingerprint: certificate.fingerprint256, validTo: new Date(certificate.validTo).toISOString() };
  } catch {
    return null;
  }
}
