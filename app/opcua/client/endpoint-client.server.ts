/**
 * One shared session to one server. Everybody who looks at the server through Ferrule uses it: a small controller has few
 * sessions to give. It connects when first used, makes itself anew when the server vanishes and returns, keeps what is
 * watched across that, and closes when nobody has used it for a while. It reads and browses; it never writes.
 */
import { join } from "node:path";
import {
  type ClientSession,
  ClientSubscription,
  MessageSecurityMode,
  OPCUACertificateManager,
  OPCUAClient,
  SecurityPolicy,
  type UserIdentityInfo,
  UserTokenType,
} from "node-opcua";
import { CONNECT_LIMIT, IDLE_LIMIT, PUBLISHING_INTERVAL, REQUEST_LIMIT, type ConnectionState, type EndpointSettings } from "./endpoint-settings";
import { WatchList } from "./watch-list.server";
import type { Sample } from "~/domain/live/sample";

type Connection = { client: OPCUAClient; session: ClientSession; subscription: ClientSubscription | undefined; namespaces: string[] };

const RETRY_DELAYS = [500, 1_000, 2_000, 5_000, 10_000];

export class EndpointClient {
  readonly settings: EndpointSettings;
  #state: ConnectionState = "connecting";
  #connection: Promise<Connection> | undefined;
  #attempt = 0;
  #retry: NodeJS.Timeout | undefined;
  #idle: NodeJS.Timeout | undefined;
  #isDisposed = false;
  #holds = 0;
  readonly #watches: WatchList;
  readonly #listeners = new Set<(state: ConnectionState) => void>();
  readonly #onDispose: () => void;

  constructor(settings: EndpointSettings, onDispose: () => void = () => undefined) {
    this.settings = settings;
    this.#onDispose = onDispose;
    this.#watches = new WatchList(() => this.#useSubscription());
  }

  get state(): ConnectionState {
    return this.#state;
  }

  get watchedCount(): number {
    return this.#watches.size;
  }

  onState(listener: (state: ConnectionState) => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  /** Runs a piece of work on the session, within the limit; connects first when needed. Throws when the server does not answer. */
  async use<T>(work: (session: ClientSession, namespaces: readonly string[]) => Promise<T>): Promise<T> {
    this.#touch();
    const { session, namespaces } = await this.#connect();
    return withLimit(work(session, namespaces), REQUEST_LIMIT, "no answer in time");
  }

  /** Watches a node; the listener gets the newest sample at most once per publishing interval. Answers the end of the watch. */
  watch(nodeId: string, listener: (sample: Sample) => void): () => void {
    this.#touch();
    const end = this.#watches.add(nodeId, listener);
    return () => {
      end();
      this.#touch();
    };
  }

  /** Keeps the session open for work longer than the idle limit, until the answered function is called. */
  hold(): () => void {
    this.#holds++;
    this.#touch();
    let isHeld = true;
    return () => {
      if (!isHeld) return;
      isHeld = false;
      this.#holds--;
      this.#touch();
    };
  }

  async dispose(): Promise<void> {
    if (this.#isDisposed) return;
    this.#isDisposed = true;
    clearTimeout(this.#retry);
    clearTimeout(this.#idle);
    this.#watches.clear();
    this.#onDispose();
    const connection = this.#connection;
    this.#connection = undefined;
    await connection?.then(closeConnection, () => undefined);
  }

  /** Puts the idle clock back; a client that is watched or held never idles. */
  #touch(): void {
    clearTimeout(this.#idle);
    if (this.#isDisposed) return;
    this.#idle = setTimeout(() => {
      if (this.#watches.size === 0 && this.#holds === 0) void this.dispose();
    }, IDLE_LIMIT);
    this.#idle.unref();
  }

  #connect(): Promise<Connection> {
    if (this.#isDisposed) return Promise.reject(new Error("This connection was closed."));
    if (this.#connection) return this.#connection;
    const connecting = openConnection(this.settings).then(
      (connection) => {
        this.#attempt = 0;
        this.#follow(connection);
        this.#setState("connected");
        void this.#watches.restart();
        return connection;
      },
      (error: unknown) => {
        this.#connection = undefined;
        this.#setState("lost");
        this.#scheduleRetry();
        throw error;
      },
    );
    this.#connection = connecting;
    return connecting;
  }

  #follow(connection: Connection): void {
    const lost = (): void => this.#lose(connection);
    connection.client.once("connection_lost", lost);
    connection.client.once("close", lost);
    connection.session.once("session_closed", lost);
  }

  #lose(connection: Connection): void {
    if (this.#isDisposed || this.#connection === undefined) return;
    const current = this.#connection;
    void current.then((open) => {
      if (open !== connection || this.#connection !== current) return;
      this.#connection = undefined;
      this.#watches.suspend();
      this.#setState("lost");
      void closeConnection(connection);
      this.#scheduleRetry();
    });
  }

  /** Tries again only while somebody watches; without watchers the next use connects. */
  #scheduleRetry(): void {
    clearTimeout(this.#retry);
    if (this.#isDisposed || this.#watches.size === 0) return;
    const delay = RETRY_DELAYS[Math.min(this.#attempt++, RETRY_DELAYS.length - 1)] ?? 10_000;
    this.#retry = setTimeout(() => void this.#connect().catch(() => undefined), delay);
    this.#retry.unref();
  }

  async #useSubscription(): Promise<{ session: ClientSession; subscription: ClientSubscription; namespaces: readonly string[] }> {
    const connection = await this.#connect();
    connection.subscription ??= ClientSubscription.create(connection.session, {
      requestedPublishingInterval: PUBLISHING_INTERVAL,
      requestedLifetimeCount: 120,
      requestedMaxKeepAliveCount: 10,
      maxNotificationsPerPublish: 2_000,
      publishingEnabled: true,
      priority: 1,
    });
    const { session, subscription, namespaces } = connection;
    return { session, subscription, namespaces };
  }

  #setState(state: ConnectionState): void {
    if (this.#state === state) return;
    this.#state = state;
    for (const listener of this.#listeners) listener(state);
  }
}

async function openConnection(settings: EndpointSettings): Promise<Connection> {
  const certificates = new OPCUACertificateManager({
    rootFolder: join(settings.pkiFolder, "client"),
    // A pinned certificate is compared by the client itself; without one the endpoint's trust was decided when it was listed.
    automaticallyAcceptUnknownCertificate: true,
    disableFileWatchers: true,
  });
  const client = OPCUAClient.create({
    applicationName: "Ferrule live view",
    clientName: "Ferrule live view",
    clientCertificateManager: certificates,
    ...toWireSecurity(settings.security),
    ...(settings.certificate ? { serverCertificate: settings.certificate } : {}),
    endpointMustExist: false,
    connectionStrategy: { maxRetry: 0, initialDelay: 200 },
    keepSessionAlive: true,
    requestedSessionTimeout: 60_000,
    transportTimeout: REQUEST_LIMIT,
  });
  try {
    return await withLimit(openSession(client, settings), CONNECT_LIMIT, "no connection in time");
  } catch (error) {
    await client.disconnect().catch(() => undefined);
    throw error;
  }
}

const MODES = {
  none: MessageSecurityMode.None,
  sign: MessageSecurityMode.Sign,
  "sign-and-encrypt": MessageSecurityMode.SignAndEncrypt,
} as const;

function toWireSecurity({ mode, policy }: EndpointSettings["security"]): { securityMode: MessageSecurityMode; securityPolicy: SecurityPolicy } {
  return { securityMode: MODES[mode], securityPolicy: mode === "none" ? SecurityPolicy.None : SecurityPolicy[policy] };
}

function toIdentity(token: EndpointSettings["token"]): UserIdentityInfo {
  switch (token.kind) {
    case "anonymous":
      return { type: UserTokenType.Anonymous };
    case "user-name":
      return { type: UserTokenType.UserName, userName: token.userName, password: token.password };
    case "certificate":
      return { type: UserTokenType.Certificate, certificateData: token.certificate, privateKey: token.privateKey };
  }
}

async function openSession(client: OPCUAClient, settings: EndpointSettings): Promise<Connection> {
  await client.connect(settings.endpointUrl);
  const session = await client.createSession(toIdentity(settings.token));
  const namespaces = await session.readNamespaceArray();
  return { client, session, subscription: undefined, namespaces };
}

async function closeConnection({ client, session }: Connection): Promise<void> {
  const close = async (): Promise<void> => {
    await session.close(true).catch(() => undefined);
    await client.disconnect().catch(() => undefined);
  };
  await withLimit(close(), 2_000, "").catch(() => undefined);
}

async function withLimit<T>(work: Promise<T>, limit: number, message: string): Promise<T> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_resolve, reject) => {
    timer = setTimeout(() => reject(new Error(message)), limit);
  });
  try {
    return await Promise.race([work, late]);
  } finally {
    clearTimeout(timer);
  }
}
