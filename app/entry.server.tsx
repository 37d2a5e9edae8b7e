import { randomBytes } from "node:crypto";
import { PassThrough } from "node:stream";
import { createReadableStreamFromReadable } from "@react-router/node";
import { isbot } from "isbot";
import { renderToPipeableStream, type RenderToPipeableStreamOptions } from "react-dom/server";
import { isRouteErrorResponse, ServerRouter, type EntryContext, type HandleErrorFunction } from "react-router";
import { startApplication } from "./services/start-application.server";
import { logError } from "./utils/log.server";
import { getContentSecurityPolicy } from "./utils/security-headers.server";

export { startApplication, stopApplication } from "./services/start-application.server";

export const streamTimeout = 8_000;

// In development no server.ts stands before us.
if (import.meta.env.DEV) {
  const { lines } = await startApplication();
  for (const line of lines) console.warn(line);
}

export default function handleRequest(
  request: Request,
  status: number,
  headers: Headers,
  context: EntryContext,
): Promise<Response> {
  const nonce = randomBytes(16).toString("base64");
  headers.set("content-type", "text/html; charset=utf-8");
  headers.set("content-security-policy", getContentSecurityPolicy(nonce));
  if (!headers.has("cache-control")) headers.set("cache-control", "no-store");
  if (request.method === "HEAD") return Promise.resolve(new Response(null, { status, headers }));
  return renderPage(request, status, headers, context, nonce);
}

function renderPage(request: Request, status: number, headers: Headers, context: EntryContext, nonce: string): Promise<Response> {
  const ready: keyof RenderToPipeableStreamOptions = isbot(request.headers.get("user-agent")) ? "onAllReady" : "onShellReady";
  return new Promise((resolve, reject) => {
    let isShellRendered = false;
    const limit = new AbortController();
    const { pipe, abort } = renderToPipeableStream(<ServerRouter context={context} url={request.url} nonce={nonce} />, {
      nonce,
      [ready]() {
        isShellRendered = true;
        const body = new PassThrough({
          final(callback) {
            limit.abort();
            callback();
          },
        });
        pipe(body);
        resolve(new Response(createReadableStreamFromReadable(body), { status, headers }));
      },
      onShellError: reject,
      onError(error: unknown) {
        if (isShellRendered) logError(error, new URL(request.url).pathname);
      },
    });
    const timer = setTimeout(abort, streamTimeout + 1_000);
    limit.signal.addEventListener("abort", () => clearTimeout(timer), { once: true });
  });
}

export const handleError: HandleErrorFunction = (error, { request }) => {
  if (request.signal.aborted || (isRouteErrorResponse(error) && error.status < 500)) return;
  logError(error, `${request.method} ${new URL(request.url).pathname}`);
};
