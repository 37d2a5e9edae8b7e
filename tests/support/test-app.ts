/**
 * The application's routes without a server in front: requests go to the loader or action that the route table names. Each
 * test file runs in a process of its own, so that it has its own data folder and database.
 */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { matchRoutes, type RouteObject } from "react-router";
import type { RouteConfigEntry } from "@react-router/dev/routes";
import { projectRoot } from "./source-files";

const ORIGIN = "http://localhost:3000";

export type CallOptions = {
  readonly cookie?: string;
  readonly token?: string;
  readonly headers?: Readonly<Record<string, string>>;
  readonly json?: unknown;
  readonly body?: string | Uint8Array | ReadableStream<Uint8Array>;
  /** What a browser would send; `null` leaves it out. */
  readonly origin?: string | null;
  readonly signal?: AbortSignal;
};

type Params = Readonly<Record<string, string | undefined>>;
type Handler = (args: { request: Request; params: Params; context: unknown }) => unknown;
type RouteModule = { readonly loader?: Handler; readonly action?: Handler };

export type ListedRoute = { readonly path: string; readonly file: string };

export type TestApp = {
  readonly dataFolder: string;
  readonly lines: readonly string[];
  readonly routes: readonly ListedRoute[];
  call(method: string, path: string, options?: CallOptions): Promise<Response>;
  /** Signs in and answers the cookie header. */
  signIn(email: string, password: string): Promise<string>;
  load(file: string): Promise<RouteModule>;
  /** Asks one route module, whatever else lies on its path; undefined when it has no handler for the method. */
  ask(file: string, method: string, path: string, options?: CallOptions): Promise<Response | undefined>;
  stop(): Promise<void>;
};

export async function startTestApp(env: Readonly<Record<string, string>> = {}): Promise<TestApp> {
  const dataFolder = mkdtempSync(join(tmpdir(), "ferrule-test-"));
  Object.assign(process.env, { FERRULE_DATA: dataFolder, FERRULE_DEMO: "0", ...env });
  delete process.env.DATABASE_URL;
  const application = await import("~/services/start-application.server");
  const { lines } = await application.startApplication();
  const table = (await import("~/routes")).default as RouteConfigEntry[];
  const tree = toRouteObjects(table);
  const call = (method: string, path: string, options: CallOptions = {}) => callRoute(tree, method, path, options);
  return {
    dataFolder,
    lines,
    routes: listRoutes(table),
    call,
    load: loadModule,
    ask: async (file, method, path, options = {}) => {
      const handler = pickHandler(await loadModule(file), method);
      const params = matchRoutes(tree, path)?.at(-1)?.params ?? {};
      return handler && runHandler(handler, method, new URL(path, ORIGIN), options, params);
    },
    signIn: async (email, password) => {
      const answer = await call("POST", "/api/auth/sign-in/email", { json: { email, password } });
      if (answer.status !== 200) throw new Error(`Sign-in answered ${answer.status}: ${await answer.text()}`);
      return answer.headers
        .getSetCookie()
        .map((cookie) => cookie.split(";")[0])
        .join("; ");
    },
    stop: async () => {
      await application.stopApplication();
      rmSync(dataFolder, { recursive: true, force: true });
    },
  };
}

function toRouteObjects(table: readonly RouteConfigEntry[]): RouteObject[] {
  return table.map((entry) =>
    entry.index
      ? { index: true, id: entry.file }
      : {
          id: entry.file,
          ...(entry.path === undefined ? {} : { path: entry.path }),
          children: toRouteObjects(entry.children ?? []),
        },
  );
}

function listRoutes(table: readonly RouteConfigEntry[], parent = ""): ListedRoute[] {
  return table.flatMap((entry) => {
    const path = entry.path === undefined ? parent : `${parent}/${entry.path}`;
    return [{ path: path === "" ? "/" : path, file: entry.file }, ...listRoutes(entry.children ?? [], path)];
  });
}

function loadModule(file: string): Promise<RouteModule> {
  return import(/* @vite-ignore */ join(projectRoot, "app", file)) as Promise<RouteModule>;
}

async function callRoute(tree: RouteObject[], method: string, path: string, options: CallOptions): Promise<Response> {
  const url = new URL(path, ORIGIN);
  const match = matchRoutes(tree, url.pathname)?.at(-1);
  if (!match?.route.id) throw new Error(`No route for ${path}`);
  const handler = pickHandler(await loadModule(match.route.id), method);
  return handler ? runHandler(handler, method, url, options, match.params) : new Response(null, { status: 405 });
}

function pickHandler(module: RouteModule, method: string): Handler | undefined {
  return method === "GET" || method === "HEAD" ? module.loader : module.action;
}

async function runHandler(
  handler: Handler,
  method: string,
  url: URL,
  options: CallOptions,
  params: Params,
): Promise<Response> {
  try {
    const answer = await handler({ request: makeRequest(method, url, options), params, context: {} });
    if (answer instanceof Response) return answer;
    const wrapped = answer as { type?: string; data?: unknown; init?: ResponseInit } | null;
    return wrapped?.type === "DataWithResponseInit"
      ? Response.json(wrapped.data, wrapped.init ?? undefined)
      : Response.json(answer ?? null);
  } catch (thrown) {
    if (thrown instanceof Response) return thrown;
    throw thrown;
  }
}

function makeRequest(method: string, url: URL, options: CallOptions): Request {
  const headers = new Headers({ "x-ferrule-client-address": "127.0.0.1", ...options.headers });
  if (options.cookie) headers.set("cookie", options.cookie);
  if (options.token) headers.set("authorization", `Bearer ${options.token}`);
  const isChange = method !== "GET" && method !== "HEAD";
  if (isChange && options.origin !== null) headers.set("origin", options.origin ?? ORIGIN);
  const body = options.json === undefined ? options.body : JSON.stringify(options.json);
  if (options.json !== undefined) headers.set("content-type", "application/json");
  return new Request(url, {
    method,
    headers,
    ...(options.signal ? { signal: options.signal } : {}),
    ...(body === undefined ? {} : { body: body as BodyInit, duplex: "half" }),
  });
}
