/**
 * Reads a NodeSet2 file (OPC 10000-6 Annex F, UANodeSet.xsd) in one pass over its text.
 *
 * Nothing is lost: what the schema does not know is kept beside what it knows. Elements of the head may stand in any
 * order; when a table that ids depend on stands behind nodes, the text is read a second time with the tables known.
 */
import { OPC_UA_NAMESPACE } from "../address-space/node-id";
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { checkContent } from "./check-content";
import type { NodeSetContent } from "./nodeset-content";
import { READ_LIMITS, type ReadLimits } from "./limits";
import { NodeSetReader } from "./nodeset-reader";
import { scanXml } from "./xml/scan-xml";

export type ReadOptions = {
  /** Named in the places of problems. */
  readonly fileName?: string;
  readonly limits?: Partial<ReadLimits>;
  /** Characters done and in all, now and then. */
  readonly onProgress?: (done: number, total: number) => void;
  /** Asked now and then; true stops the read with the problem `limit.time`. The domain has no clock of its own. */
  readonly shouldStop?: () => boolean;
};

/**
 * Fails when the text is no NodeSet2 file, is not well-formed, or exceeds a limit; every other problem leaves a value:
 * a node without a usable NodeId is left out, an attribute that cannot be read is kept as written.
 */
export function readNodeSet(text: string, options: ReadOptions = {}): Result<NodeSetContent> {
  const limits: ReadLimits = { ...READ_LIMITS, ...options.limits };
  const result = readText(text, limits, options);
  if (options.fileName === undefined || result.problems.length === 0) return result;
  const problems = result.problems.map((found) => inFile(found, options.fileName ?? ""));
  return result.ok ? ok(result.value, problems) : fail(...problems);
}

function readText(text: string, limits: ReadLimits, options: ReadOptions): Result<NodeSetContent> {
  if (text.length > limits.maxBytes) {
    return fail(problem("limit.file-size", { size: text.length, limit: limits.maxBytes }));
  }
  if (text.trim() === "") return fail(problem("file.empty", undefined, { line: 1, column: 1 }));
  const hasCarriageReturns = text.includes("\r");
  const source = hasCarriageReturns ? text.replace(/\r\n?/g, "\n") : text;
  let reader = new NodeSetReader(source, limits, undefined);
  const scan = { limits, ...pick(options) };
  let stopped = scanXml(source, reader, scan);
  if (stopped === undefined && reader.lateTables) {
    const tables = reader.lateTables;
    reader = new NodeSetReader(source, limits, tables);
    stopped = scanXml(source, reader, scan);
  }
  if (hasCarriageReturns) {
    reader.problems.add(problem.hint("encoding.line-ends", undefined, { line: 1, column: source.indexOf("\n") + 1 }));
  }
  if (stopped) return fail(stopped, ...reader.problems.toArray().filter((found) => found !== stopped));
  const content = reader.finish();
  const refusal = checkContent(content, reader);
  if (refusal) return fail(refusal, ...reader.problems.toArray());
  return ok(withModel(content), reader.problems.toArray());
}

/** A base NodeSet without Models table still is the model of the standard's namespace. */
function withModel(content: NodeSetContent): NodeSetContent {
  const { header } = content;
  if (header.models.length > 0 || header.namespaceUris.length > 0) return content;
  return { ...content, header: { ...header, models: [{ modelUri: OPC_UA_NAMESPACE, requiredModels: [] }] } };
}

function pick(options: ReadOptions): Pick<ReadOptions, "onProgress" | "shouldStop"> {
  return {
    ...(options.onProgress ? { onProgress: options.onProgress } : {}),
    ...(options.shouldStop ? { shouldStop: options.shouldStop } : {}),
  };
}

function inFile(found: Problem, file: string): Problem {
  return { ...found, at: { file, ...found.at } };
}
