/** Whether an endpoint may be reached, and who its sessions are for. */
import { listAllowances, type EndpointRow } from "../db/repositories/endpoints.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { isAllowed, parseEndpointUrl } from "../domain/live/endpoint-address";
import type { EndpointToken } from "../opcua/client/endpoint-settings";
import { openSealed, sealText } from "../utils/seal.server";

const SECRET_PURPOSE = "endpoint secret";

/** Problems: `endpoint.address`, `endpoint.not-allowed`. */
export async function requireReachable(organizationId: string, url: string): Promise<Result<null>> {
  const address = parseEndpointUrl(url);
  if (!address.ok) return address;
  const { host, port } = address.value;
  return isAllowed(address.value, await listAllowances(organizationId)) ? ok(null) : fail(problem("endpoint.not-allowed", { host, port }));
}

export function sealEndpointSecret(secret: string): string {
  return sealText(secret, SECRET_PURPOSE);
}

/** Who a session with the endpoint is for. Throws when the secret was sealed by another installation. */
export function readEndpointToken(row: EndpointRow): EndpointToken {
  const secret = row.secret === null ? "" : openSealed(row.secret, SECRET_PURPOSE);
  if (row.tokenKind === "user-name") return { kind: "user-name", userName: row.userName ?? "", password: secret };
  if (row.tokenKind === "certificate") return { kind: "certificate", certificate: Buffer.from(row.userCertificate ?? "", "base64"), privateKey: secret };
  return { kind: "anonymous" };
}
