/** What the reading worker is asked and answers. Nodes travel as pack text, which is far cheaper than a structured clone. */
import type { NodeKey } from "../domain/address-space/node-id";
import { getValue, type Result } from "../domain/core/result";
import { readPack, writePack } from "../domain/nodeset/pack";
import type { NodeSetContent } from "../domain/nodeset/nodeset-content";

export type ReadRequest = {
  readonly bytes: Uint8Array;
  readonly fileName: string | undefined;
  readonly milliseconds: number;
};

export type ReadAnswer = {
  readonly pack: string;
  /** Line and column of each node in turn. */
  readonly places: Uint32Array;
  readonly modelPlaces: NodeSetContent["modelPlaces"];
  readonly isWhole: boolean;
};

export type ReadStep =
  | { readonly kind: "progress"; readonly done: number; readonly total: number }
  | { readonly kind: "done"; readonly result: Result<ReadAnswer> };

export function packResult(content: NodeSetContent): ReadAnswer {
  const places = new Uint32Array(content.nodes.length * 2);
  content.nodes.forEach((node, i) => {
    const place = content.lines.get(node.key);
    places[2 * i] = place?.line ?? 0;
    places[2 * i + 1] = place?.column ?? 0;
  });
  return { pack: writePack(content), places, modelPlaces: content.modelPlaces, isWhole: content.isWhole };
}

export function unpackResult(answer: ReadAnswer): NodeSetContent {
  const { header, nodes } = getValue(readPack(answer.pack));
  const lines = new Map<NodeKey, { line: number; column: number }>();
  nodes.forEach((node, i) => {
    lines.set(node.key, { line: answer.places[2 * i] ?? 0, column: answer.places[2 * i + 1] ?? 0 });
  });
  return { header, nodes, lines, modelPlaces: answer.modelPlaces, isWhole: answer.isWhole };
}
