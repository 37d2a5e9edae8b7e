/** `as-built`: whether a running server serves what a NodeSet2 file says. It reads and never writes. */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { AddressSpace, buildLayer } from "../domain/address-space/address-space";
import { getOwnNamespace } from "../domain/address-space/model-header";
import type { AsBuiltDifference, AsBuiltVerdict } from "../domain/as-built/as-built";
import { groupDifferences } from "../domain/as-built/as-built-report";
import { fail, ok, problem, type Result } from "../domain/core/result";
import type { Discovery, OfferedEndpoint } from "../domain/live/discovery";
import { listRequired } from "../library/describe-nodeset.server";
import { getLibrary } from "../library/library.server";
import { ANONYMOUS, UNPROTECTED, type EndpointSettings } from "../opcua/client/endpoint-settings";
import { compareEndpoint, type EndpointComparison } from "../services/compare-endpoint.server";
import { resolvePath, UsageError, type AsBuiltCommand } from "./parse-command-line";
import { refuse } from "./print-problems";
import { readFolders, readInput } from "./read-input";

const EXIT_CODES: Readonly<Record<AsBuiltVerdict, number>> = { "as released": 0, differs: 1, "not shown": 2 };

export async function asBuilt(command: AsBuiltCommand): Promise<number> {
  keepOutputClean();
  const space = await loadSpace(command);
  if (!space.ok) return refuse(command, command.file, space.problems);
  const scratch = command.pki === undefined ? mkdtempSync(join(tmpdir(), "ferrule-as-built-")) : undefined;
  try {
    const settings = await findSettings(command, scratch ?? resolvePath(command.pki ?? "."));
    if (!settings.ok) return refuse(command, command.endpoint, settings.problems);
    const compared = await compareLive(command, space.value, settings.value);
    if (!compared.ok) return refuse(command, command.endpoint, compared.problems);
    process.stdout.write(command.isJson ? toJson(command, compared.value) : format(compared.value));
    return EXIT_CODES[compared.value.comparison.verdict];
  } finally {
    if (scratch !== undefined) rmSync(scratch, { recursive: true, force: true });
  }
}

async function loadSpace(command: AsBuiltCommand): Promise<Result<AddressSpace>> {
  const folders = await readFolders(command.folders);
  if (!folders.ok) return folders;
  const content = await readInput(command.file);
  if (!content.ok) return content;
  const { header, nodes } = content.value;
  const layers = await getLibrary().resolve(listRequired(header), { extra: folders.value, requiredBy: getOwnNamespace(header) });
  if (!layers.ok || layers.problems.some((found) => found.severity === "error")) return fail(...layers.problems);
  return ok(AddressSpace.of(layers.value, buildLayer(header, nodes)));
}

/** The protected endpoint whose certificate the caller knows; an unprotected one only when it is asked for. */
async function findSettings(command: AsBuiltCommand, pkiFolder: string): Promise<Result<EndpointSettings>> {
  const base = { id: "as-built", endpointUrl: command.endpoint, pkiFolder };
  if (command.security === "none") return ok({ ...base, security: UNPROTECTED, token: ANONYMOUS, certificate: undefined });
  const discovery = await discover(command.endpoint);
  if (!discovery.ok) return discovery;
  const { endpoints, certificate } = discovery.value;
  const wanted = command.security ?? "sign-and-encrypt";
  const offered = endpoints.find((e) => e.securityMode === wanted && e.isKnown);
  if (!offered || !certificate) return fail(problem("endpoint.security-not-offered", { endpointUrl: command.endpoint, security: wanted }));
  if (command.fingerprint === undefined || toHex(command.fingerprint) !== toHex(certificate.fingerprint)) {
    const { fingerprint, subject, validTo } = certificate;
    const code = command.fingerprint === undefined ? "endpoint.not-pinned" : "endpoint.other-certificate";
    return fail(problem(code, { endpointUrl: command.endpoint, fingerprint, subject, validTo }));
  }
  const policy = offered.securityPolicy as EndpointSettings["security"]["policy"];
  return ok({ ...base, security: { mode: wanted, policy }, token: toToken(command, offered), certificate: Buffer.from(certificate.data, "base64") });
}

async function discover(endpointUrl: string): Promise<Result<Discovery>> {
  try {
    const { discoverEndpoints } = await import("../opcua/client/discover.server");
    return ok(await discoverEndpoints(endpointUrl));
  } catch (error) {
    return fail(unreachable(endpointUrl, error));
  }
}

function toToken({ user, password }: AsBuiltCommand, offered: OfferedEndpoint): EndpointSettings["token"] {
  if (user === undefined) return ANONYMOUS;
  if (!offered.tokens.includes("user-name")) throw new UsageError("The server takes no user names.");
  return { kind: "user-name", userName: user, password: password ?? "" };
}

function toHex(fingerprint: string): string {
  return fingerprint.replaceAll(/[^0-9a-f]/gi, "").toUpperCase();
}

/** The library tells its worries on the output, which belongs to the report. */
function keepOutputClean(): void {
  console.log = console.error;
}

async function compareLive(command: AsBuiltCommand, space: AddressSpace, settings: EndpointSettings): Promise<Result<EndpointComparison>> {
  const { EndpointClient } = await import("../opcua/client/endpoint-client.server");
  const client = new EndpointClient(settings);
  try {
    return ok(await compareEndpoint(space, client, { tolerance: { ignored: command.ignored, range: 0, areTextsChecked: false }, watchSeconds: command.watchSeconds }));
  } catch (error) {
    return fail(unreachable(settings.endpointUrl, error));
  } finally {
    await client.dispose();
  }
}

function unreachable(endpointUrl: string, error: unknown) {
  return problem("endpoint.unreachable", { endpointUrl, detail: error instanceof Error ? (error.message.split("\n")[0] ?? "") : "no reason given" });
}

function toJson(command: AsBuiltCommand, { comparison, observations, servedNodes, remarks }: EndpointComparison): string {
  const { verdict, counts, differences } = comparison;
  const body = { file: command.file, endpointUrl: command.endpoint, verdict, counts: { ...counts, servedNodes, watched: observations.length }, differences, remarks };
  return `${JSON.stringify(body, null, 2)}\n`;
}

function format({ comparison, observations, servedNodes, remarks }: EndpointComparison): string {
  const { verdict, counts, differences } = comparison;
  const lines = groupDifferences(differences).flatMap(({ list }) => list.map(formatDifference));
  lines.push(...remarks);
  lines.push(`${counts.nodes} nodes of the model compared with ${servedNodes} of the server, ${observations.length} Variables watched.`);
  lines.push(`${counts.counted} differences count, ${counts.ignored} do not: ${verdict}.`);
  return `${lines.join("\n")}\n`;
}

function formatDifference({ aspect, path, detail, released, found, ignoredBy }: AsBuiltDifference): string {
  const what = `${aspect} ${path}${detail === undefined ? "" : ` ${detail}`}: ${released ?? "–"} → ${found ?? "–"}`;
  return ignoredBy === undefined ? what : `(${what}, does not count: ${ignoredBy})`;
}
