/** What a server offers before anybody signs in: GetEndpoints (OPC 10000-4 §5.5.4), over an unprotected channel as the standard has it. */
import { X509Certificate } from "node:crypto";
import { MessageSecurityMode, OPCUAClient, SecurityPolicy, UserTokenType, fromURI, type EndpointDescription } from "node-opcua";
import type { Discovery, OfferedCertificate, OfferedEndpoint } from "~/domain/live/discovery";
import { CONNECT_LIMIT, securityPolicies } from "./endpoint-settings";

/** Throws when the server does not answer in time. */
export async function discoverEndpoints(endpointUrl: string): Promise<Discovery> {
  const client = OPCUAClient.create({ endpointMustExist: false, connectionStrategy: { maxRetry: 0, initialDelay: 200 }, transportTimeout: CONNECT_LIMIT });
  try {
    await client.connect(endpointUrl);
    const found = await client.getEndpoints({ endpointUrl });
    const server = found[0]?.server;
    return {
      applicationName: server?.applicationName.text ?? "",
      applicationUri: server?.applicationUri ?? "",
      productUri: server?.productUri ?? "",
      endpoints: found.map(describeEndpoint).sort((a, b) => b.securityLevel - a.securityLevel),
      certificate: describeCertificate(found.find((e) => e.serverCertificate?.length > 0)?.serverCertificate),
    };
  } finally {
    await client.disconnect().catch(() => undefined);
  }
}

const MODES = { [MessageSecurityMode.Sign]: "sign", [MessageSecurityMode.SignAndEncrypt]: "sign-and-encrypt" } as const;
const TOKENS = { [UserTokenType.Anonymous]: "anonymous", [UserTokenType.UserName]: "user-name", [UserTokenType.Certificate]: "certificate" } as const;

function describeEndpoint(found: EndpointDescription): OfferedEndpoint {
  const policy = fromURI(found.securityPolicyUri);
  const name = policy === SecurityPolicy.None ? "None" : (policy.split("#").at(-1) ?? policy);
  return {
    url: found.endpointUrl ?? "",
    securityMode: found.securityMode in MODES ? MODES[found.securityMode as keyof typeof MODES] : "none",
    securityPolicy: name,
    isKnown: name === "None" || (securityPolicies as readonly string[]).includes(name),
    tokens: [...new Set((found.userIdentityTokens ?? []).flatMap((token) => (token.tokenType in TOKENS ? [TOKENS[token.tokenType as keyof typeof TOKENS]] : [])))],
    securityLevel: found.securityLevel,
  };
}

function describeCertificate(der: Buffer | undefined): OfferedCertificate | null {
  if (!der || der.length === 0) return null;
  try {
    const certificate = new X509Certificate(der);
    return {
      data: der.toString("base64"),
      fingerprint: certificate.fingerprint256,
      subject: certificate.subject.replaceAll("\n", ", "),
      issuer: certificate.issuer.replaceAll("\n", ", "),
      isSelfSigned: certificate.checkIssued(certificate),
      validFrom: new Date(certificate.validFrom).toISOString(),
      validTo: new Date(certificate.validTo).toISOString(),
    };
  } catch {
    return null;
  }
}
