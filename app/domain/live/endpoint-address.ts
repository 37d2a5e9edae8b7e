/** Addresses of OPC UA servers, and which of them an organisation lets Ferrule reach. */
import { fail, ok, problem, type Result } from "../core/result";

export type EndpointAddress = { readonly host: string; readonly port: number };

/** A host by name, `*.` and the end of names, an IPv4 address, or a block of them (`10.20.0.0/16`); ports from … to. */
export type EndpointAllowance = { readonly host: string; readonly portFrom: number; readonly portTo: number };

/** The port that OPC UA registered (IANA service opcua-tcp). */
export const DEFAULT_PORT = 4840;

/** Reads `opc.tcp://host[:port][/path]`. Problem: `endpoint.address`. */
export function parseEndpointUrl(text: string): Result<EndpointAddress> {
  const match = /^opc\.tcp:\/\/(\[[0-9a-f:.]+\]|[^/?#:@\s]+)(?::(\d{1,5}))?(?:\/[^\s]*)?$/i.exec(text.trim());
  const port = match?.[2] === undefined ? DEFAULT_PORT : Number(match[2]);
  if (!match?.[1] || port < 1 || port > 65_535) return fail(problem("endpoint.address", { text: text.slice(0, 200) }));
  return ok({ host: match[1].replace(/^\[|\]$/g, "").toLowerCase(), port });
}

/** Reads what an administrator wrote as a host. Problem: `endpoint.allowance-host`. */
export function parseAllowanceHost(text: string): Result<string> {
  const host = text.trim().toLowerCase();
  const isName = /^(?:\*\.)?[a-z0-9](?:[a-z0-9-]*[a-z0-9])?(?:\.[a-z0-9](?:[a-z0-9-]*[a-z0-9])?)*$/.test(host);
  const isBlock = host.includes("/") && readBlock(host) !== undefined;
  const isIpv6 = /^[0-9a-f:]+$/.test(host) && host.includes(":");
  return isName || isBlock || isIpv6 ? ok(host) : fail(problem("endpoint.allowance-host", { text: text.slice(0, 200) }));
}

/** Whether one of the allowances covers the address. */
export function isAllowed({ host, port }: EndpointAddress, allowances: readonly EndpointAllowance[]): boolean {
  return allowances.some((allowance) => port >= allowance.portFrom && port <= allowance.portTo && coversHost(allowance.host, host));
}

function coversHost(allowed: string, host: string): boolean {
  if (allowed.startsWith("*.")) return host.endsWith(allowed.slice(1)) && host.length > allowed.length - 1;
  if (!allowed.includes("/")) return allowed === host;
  const [block, address] = [readBlock(allowed), readIpv4(host)];
  return block !== undefined && address !== undefined && Math.floor(address / block.size) === Math.floor(block.start / block.size);
}

function readBlock(text: string): { start: number; size: number } | undefined {
  const [address = "", bits = ""] = text.split("/");
  const start = readIpv4(address);
  const length = /^\d{1,2}$/.test(bits) ? Number(bits) : -1;
  return start === undefined || length < 0 || length > 32 ? undefined : { start, size: 2 ** (32 - length) };
}

function readIpv4(text: string): number | undefined {
  const parts = text.split(".");
  if (parts.length !== 4 || !parts.every((part) => /^\d{1,3}$/.test(part) && Number(part) <= 255)) return undefined;
  return parts.reduce((sum, part) => sum * 256 + Number(part), 0);
}
