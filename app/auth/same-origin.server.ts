/**
 * State-changing requests must come from our own pages. Browsers name the origin of every such request; a program
 * outside a browser may leave it out, and then it cannot have been misled by another site either.
 */
import { getEnvironment } from "../utils/env.server";

export function getExpectedOrigins(request: Request): string[] {
  const { publicOrigin } = getEnvironment();
  const own = new URL(request.url).origin;
  return publicOrigin && publicOrigin !== own ? [own, publicOrigin] : [own];
}

export function isStateChanging(request: Request): boolean {
  return !["GET", "HEAD", "OPTIONS"].includes(request.method.toUpperCase());
}

export function isFromOwnOrigin(request: Request): boolean {
  const origin = request.headers.get("origin");
  if (origin !== null) return getExpectedOrigins(request).includes(origin);
  const site = request.headers.get("sec-fetch-site");
  return site === null || site === "same-origin" || site === "none";
}
