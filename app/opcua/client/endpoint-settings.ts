/** How to reach a server, and the limits of one shared session. Times are milliseconds. */
export const securityModes = ["none", "sign", "sign-and-encrypt"] as const;
export const securityPolicies = ["Basic256Sha256", "Aes128_Sha256_RsaOaep", "Aes256_Sha256_RsaPss"] as const;

/** How messages are protected; the policy counts where the mode is not "none". */
export type EndpointSecurity = { readonly mode: (typeof securityModes)[number]; readonly policy: (typeof securityPolicies)[number] };

/** Who the session is for. `privateKey` is PEM, `certificate` DER. */
export type EndpointToken =
  | { readonly kind: "anonymous" }
  | { readonly kind: "user-name"; readonly userName: string; readonly password: string }
  | { readonly kind: "certificate"; readonly certificate: Buffer; readonly privateKey: string };

export type EndpointSettings = {
  /** Names the shared session; two askers with the same id share one. */
  readonly id: string;
  readonly endpointUrl: string;
  readonly security: EndpointSecurity;
  readonly token: EndpointToken;
  /** The server's certificate, DER, when it is known: then no other server is talked to. */
  readonly certificate: Buffer | undefined;
  /** Folder of our own client certificate. */
  readonly pkiFolder: string;
};

/** What our own test servers ask for. */
export const PROTECTED: EndpointSecurity = { mode: "sign-and-encrypt", policy: "Basic256Sha256" };
export const UNPROTECTED: EndpointSecurity = { mode: "none", policy: "Basic256Sha256" };
export const ANONYMOUS: EndpointToken = { kind: "anonymous" };

export type ConnectionState = "connecting" | "connected" | "lost";

export const CONNECT_LIMIT = 8_000;
export const REQUEST_LIMIT = 10_000;
/** A session that nobody uses is closed after this time. */
export const IDLE_LIMIT = 60_000;
/** Watched nodes of one endpoint, all browsers together. */
export const WATCH_LIMIT = 5_000;
export const BROWSE_PAGE = 500;
export const PUBLISHING_INTERVAL = 500;
