import { MessageSecurityMode, OPCUACertificateManager, OPCUAServer, SecurityPolicy, WellKnownRoles, makeRoles } from "node-opcua";
import type { StartMessage } from "../messages";

/**
 * Keys and certificates of this server alone, below the data folder; a simulation never borrows a machine's certificate.
 * The server is bound to loopback and has nothing to guard, so that clients are let in unknown; users are not.
 */
export async function createCertificateManager(folder: string, trust: { acceptsUnknown: boolean }): Promise<OPCUACertificateManager> {
  const manager = new OPCUACertificateManager({
    rootFolder: folder,
    automaticallyAcceptUnknownCertificate: trust.acceptsUnknown,
    disableFileWatchers: true,
  });
  await manager.initialize();
  return manager;
}

/** Those of OPC 10000-7 that are neither deprecated nor of elliptic curves. */
const PROTECTED_POLICIES = [SecurityPolicy.Basic256Sha256, SecurityPolicy.Aes128_Sha256_RsaOaep, SecurityPolicy.Aes256_Sha256_RsaPss];

/** The server as the start message wants it, not yet initialised. It never registers with a discovery server. */
export function createServer(config: StartMessage, certificates: OPCUACertificateManager, userCertificates: OPCUACertificateManager): OPCUAServer {
  const isOpen = config.security.includes("none");
  const isSecured = config.security.includes("basic256sha256");
  return new OPCUAServer({
    host: config.host,
    hostname: config.host,
    port: config.port,
    nodesets: config.nodeSetFiles,
    serverInfo: { applicationUri: config.applicationUri, productUri: "urn:ferrule:simulation", applicationName: { text: config.applicationName, locale: "en" } },
    buildInfo: { productName: "Ferrule simulation", manufacturerName: "Ferrule", productUri: "urn:ferrule:simulation" },
    serverCertificateManager: certificates,
    userCertificateManager: userCertificates,
    securityPolicies: [...(isOpen ? [SecurityPolicy.None] : []), ...(isSecured ? PROTECTED_POLICIES : [])],
    securityModes: [
      ...(isOpen ? [MessageSecurityMode.None] : []),
      ...(isSecured ? [MessageSecurityMode.Sign, MessageSecurityMode.SignAndEncrypt] : []),
    ],
    allowAnonymous: true,
    userManager: {
      isValidUser: (userName: string, password: string) => userName === config.userName && password === config.password,
      getUserRoles: (userName: string) =>
        userName === config.userName ? makeRoles([WellKnownRoles.AuthenticatedUser, WellKnownRoles.Operator]) : makeRoles([WellKnownRoles.Anonymous]),
    },
    serverCapabilities: { maxSessions: config.maxSessions },
    maxConnectionsPerEndpoint: config.maxSessions + 2,
    isAuditing: false,
  });
}
