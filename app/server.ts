/** The process of the web application: checks the port, serves the built files, hands requests on, and ends in order. */
import { existsSync, rmSync } from "node:fs";
import type { Server } from "node:http";
import { createServer } from "node:net";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import express, { type ErrorRequestHandler, type RequestHandler } from "express";
import type { ServerBuild } from "react-router";
import { CLIENT_ADDRESS_HEADER } from "./utils/client-address.server";
import { EnvironmentError, getEnvironment } from "./utils/env.server";
import { findProjectRoot } from "./utils/project-root.server";
import { securityHeaders } from "./utils/security-headers.server";
import { serveCompressed } from "./utils/serve-compressed.server";

const ONE_YEAR = "1y";
const EXIT_LIMIT_MS = 4800;
const MAX_FORM_BYTES = 2 * 1024 * 1024;

type ApplicationEntry = {
  startApplication(): Promise<{ lines: readonly string[] }>;
  stopApplication(): Promise<string[]>;
};

/** The web application's bundle; its entry exports start and stop beside what the router asks for. */
type ApplicationBuild = ServerBuild & { readonly entry: { readonly module: ServerBuild["entry"]["module"] & ApplicationEntry } };

function stopWith(message: string): never {
  console.error(message);
  process.exit(1);
}

function readCommandLine(): void {
  const known = new Set(["--demo", "--reset"]);
  const unknown = process.argv.slice(2).filter((argument) => !known.has(argument));
  if (unknown.length > 0) stopWith(`Unknown: ${unknown.join(" ")}. Known are --demo and, with it, --reset.`);
  if (process.argv.includes("--demo")) process.env.FERRULE_DEMO = "1";
  if (process.argv.includes("--reset") && process.env.FERRULE_DEMO !== "1") stopWith("--reset starts the demo anew; use it with --demo.");
}

/** Answers the error code of an attempt to listen, or undefined when the port is free. */
function tryPort(port: number, host: string): Promise<string | undefined> {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once("error", (error: NodeJS.ErrnoException) => resolve(error.code ?? "unknown"));
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(undefined)));
  });
}

async function requireFreePort(port: number, host: string): Promise<void> {
  let code = await tryPort(port, host);
  // A browser may try ::1 first when it is sent to localhost, and would then meet the other program.
  if (code === undefined && host === "127.0.0.1" && (await tryPort(port, "::1")) === "EADDRINUSE") code = "EADDRINUSE";
  if (code === undefined) return;
  if (code === "EADDRINUSE") stopWith(`Port ${port} is taken by another program on ${host}. End it, or choose another with PORT.`);
  stopWith(`Port ${port} on ${host} cannot be opened (${code}). Choose others with PORT and HOST.`);
}

/** Removes the demo's own folder; env.server.ts guarantees that nothing else lives there. */
function resetDemo(): void {
  const { isDemo, dataFolder } = getEnvironment();
  if (!isDemo) return;
  for (const name of ["ferrule.db", "ferrule.db-wal", "ferrule.db-shm", "uploads"]) {
    rmSync(join(dataFolder, name), { recursive: true, force: true });
  }
}

async function loadApplication(root: string): Promise<ApplicationBuild> {
  const file = join(root, "build", "server", "index.js");
  if (!existsSync(file)) stopWith("The application is not built. Run `npm run build` first.");
  return (await import(/* @vite-ignore */ pathToFileURL(file).href)) as ApplicationBuild;
}

const addOwnHeaders: RequestHandler = (request, response, next) => {
  request.headers[CLIENT_ADDRESS_HEADER] = request.socket.remoteAddress ?? "unknown";
  for (const [name, value] of Object.entries(securityHeaders)) response.setHeader(name, value);
  next();
};

/** Forms are small; a large one is refused before it is read into memory. Files come as multipart or raw, with limits of their own. */
const refuseLargeForms: RequestHandler = (request, response, next) => {
  const isForm = request.headers["content-type"]?.startsWith("application/x-www-form-urlencoded") === true;
  const length = request.headers["content-length"];
  if (isForm && (length === undefined || Number(length) > MAX_FORM_BYTES)) {
    response.status(413).set("connection", "close").type("text/plain").send("The form is too large.");
    return;
  }
  next();
};

/** What goes wrong before the router: never a stack trace to the client. */
const answerError: ErrorRequestHandler = (error: { status?: number; code?: string; message?: string }, _request, response, next) => {
  if (response.headersSent) {
    next(error);
    return;
  }
  const isTheirs = error.code === "ERR_INVALID_URL" || (error.status !== undefined && error.status >= 400 && error.status < 500);
  const status = isTheirs ? (error.status ?? 400) : 500;
  if (status === 500) console.error(`Ferrule error: ${error.message ?? "unknown"}`);
  response.status(status).type("text/plain").send(status === 500 ? "Something went wrong on our side." : "The request cannot be understood.");
};

async function createApplication(root: string, build: ApplicationBuild): Promise<express.Express> {
  // React looks at NODE_ENV when it is loaded, so what loads it must come after main() has set it.
  const { createRequestHandler } = await import("@react-router/express");
  const client = join(root, "build", "client");
  const app = express();
  app.disable("x-powered-by");
  app.set("trust proxy", process.env.FERRULE_ORIGIN ? "loopback" : false);
  app.use(addOwnHeaders);
  app.use("/assets", serveCompressed(join(client, "assets")));
  app.use("/assets", express.static(join(client, "assets"), { immutable: true, maxAge: ONE_YEAR, fallthrough: false, redirect: false }));
  app.use(express.static(client, { maxAge: "1h", redirect: false, index: false }));
  app.use(refuseLargeForms);
  app.use(createRequestHandler({ build, mode: "production" }));
  app.use(answerError);
  return app;
}

function endInOrder(server: Server, build: ApplicationBuild): void {
  let isEnding = false;
  const end = (signal: string) => {
    if (isEnding) return;
    isEnding = true;
    setTimeout(() => process.exit(1), EXIT_LIMIT_MS).unref();
    server.close();
    void build.entry.module.stopApplication().then((late) => {
      server.closeAllConnections();
      if (late.length > 0) console.error(`Did not end in time after ${signal}: ${late.join(", ")}`);
      process.exit(late.length > 0 ? 1 : 0);
    });
  };
  process.on("SIGTERM", end);
  process.on("SIGINT", end);
}

async function main(): Promise<void> {
  readCommandLine();
  const { port, host } = getEnvironment();
  await requireFreePort(port, host);
  if (process.argv.includes("--reset")) resetDemo();
  const root = findProjectRoot();
  process.env.NODE_ENV = "production";
  const build = await loadApplication(root);
  const { lines } = await build.entry.module.startApplication();
  const app = await createApplication(root, build);
  const server = app.listen(port, host, (error?: Error) => {
    if (error) stopWith(`Port ${port} on ${host} cannot be opened: ${error.message}`);
    for (const line of lines) console.log(line);
    const name = host === "127.0.0.1" || host === "0.0.0.0" || host === "::1" || host === "::" ? "localhost" : host;
    console.log(`Ferrule ready: http://${name}:${port}`);
  });
  server.requestTimeout = 120_000;
  server.headersTimeout = 20_000;
  endInOrder(server, build);
}

main().catch((error: unknown) => {
  stopWith(error instanceof EnvironmentError ? error.message : `Ferrule did not start: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`);
});
