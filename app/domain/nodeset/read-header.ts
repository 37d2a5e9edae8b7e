/** Reads only the head of a NodeSet2 file: which models it defines and requires. */
import type { ModelHeader } from "../address-space/model-header";
import { fail, ok, problem, type Result } from "../core/result";
import { READ_LIMITS } from "./limits";
import { NodeSetReader } from "./nodeset-reader";
import { scanXml } from "./xml/scan-xml";

/** Stops at the first node; a Models table behind nodes is not seen. Fails as `readNodeSet` does. */
export function readModelHeader(text: string): Result<ModelHeader> {
  const limits = { ...READ_LIMITS, maxNodes: 0 };
  if (text.length > limits.maxBytes) {
    return fail(problem("limit.file-size", { size: text.length, limit: limits.maxBytes }));
  }
  const source = text.includes("\r") ? text.replace(/\r\n?/g, "\n") : text;
  const reader = new NodeSetReader(source, limits, undefined);
  const stopped = scanXml(source, reader, { limits });
  if (stopped && stopped.code !== "limit.nodes") return fail(stopped);
  const { header } = reader.finish();
  if (header.models.length === 0 && header.namespaceUris.length === 0) {
    return fail(problem("nodeset.no-namespace", undefined, { line: 1, column: 1 }));
  }
  return ok(header, reader.problems.toArray());
}
