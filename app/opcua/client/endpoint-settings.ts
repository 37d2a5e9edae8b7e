/** How to reach a server, and the limits of one shared session. Times are milliseconds. */
export type EndpointSettings = {
  /** Names the shared session; two askers with the same id share one. */
  readonly id: string;
  readonly endpointUrl: string;
  readonly security: "basic256sha256" | "none";
  /** The server's certificate, DER, when it is known: then no other server is talked to. */
  readonly certificate: Buffer | undefined;
  /** Folder of our own client certificate. */
  readonly pkiFolder: string;
};

export type ConnectionState = "connecting" | "connected" | "lost";

export const CONNECT_LIMIT = 8_000;
export const REQUEST_LIMIT = 10_000;
/** A session that nobody uses is closed after this time. */
export const IDLE_LIMIT = 60_000;
/** Watched nodes of one endpoint, all browsers together. */
export const WATCH_LIMIT = 5_000;
export const BROWSE_PAGE = 500;
export const PUBLISHING_INTERVAL = 500;
