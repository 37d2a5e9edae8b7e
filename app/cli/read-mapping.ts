/** A mapping document beside a NodeSet, so that `check` runs the rules over mappings and the check cases, too. */
import { readFile, stat } from "node:fs/promises";
import type { AddressSpace } from "../domain/address-space/address-space";
import type { Wiring } from "../domain/checks/wiring";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { applyMappingDocument } from "../domain/deliver/make-mapping-document";
import { MAX_DOCUMENT_CHARACTERS, readMappingDocument, type MappingDocument } from "../domain/deliver/mapping-document";
import { applyOperations } from "../domain/editing/apply-operation";
import { makeWiring } from "../domain/mapping/make-wiring";
import { resolvePath } from "./parse-command-line";

/** Problems: `file.unreadable`, those of the document. */
export async function readMappingFile(file: string): Promise<Result<MappingDocument>> {
  try {
    const path = resolvePath(file);
    const { size } = await stat(path);
    if (size > MAX_DOCUMENT_CHARACTERS) return fail(problem("document.too-large", { size, limit: MAX_DOCUMENT_CHARACTERS }));
    return readMappingDocument(await readFile(path, "utf8"));
  } catch (error) {
    return fail(problem("file.unreadable", { file, detail: error instanceof Error ? error.message : String(error) }));
  }
}

/** The wiring of the model with the document's mapping. Problems: `deliver.no-type`, `mapping.unknown-target`. */
export function makeDocumentWiring(space: AddressSpace, document: MappingDocument): Result<Wiring> {
  const name = document.mapping.machineType;
  const type = space.listOwnNodes().find((node) => node.nodeClass === "ObjectType" && node.browseName.name === name);
  if (!type) return fail(problem("deliver.no-type", { name }));
  const operations = applyMappingDocument(space, type.key, document);
  if (!operations.ok) return operations;
  const mapped = applyOperations(space, operations.value);
  return mapped.ok ? ok(makeWiring(mapped.value, [])) : mapped;
}
