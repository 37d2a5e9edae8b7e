/** Properties of many nodes in few requests: one translation of browse paths, one read. */
import { AttributeIds, BrowsePath, type ClientSession, coerceNodeId, type NodeId, QualifiedName, RelativePath, RelativePathElement, type Variant } from "node-opcua";
import type { LiveRange, Unit } from "~/domain/live/live-node";

const HAS_PROPERTY = coerceNodeId("i=46");
/** Operations in one request; servers that allow fewer say so, and then a smaller batch would be refused by none that we met. */
const BATCH = 250;

/** The values of Properties of namespace 0, by name, for each node; what a node does not have is left out. */
export async function readProperties(session: ClientSession, nodes: readonly NodeId[], names: readonly string[]): Promise<Map<string, Variant>[]> {
  const found: Map<string, Variant>[] = nodes.map(() => new Map());
  const wanted = nodes.flatMap((node, index) => names.map((name) => ({ node, index, name })));
  for (let at = 0; at < wanted.length; at += BATCH) {
    const batch = wanted.slice(at, at + BATCH);
    const paths = await session.translateBrowsePath(batch.map(({ node, name }) => toPropertyPath(node, name)));
    const hits = batch.flatMap((entry, i) => {
      const target = paths[i]?.targets?.[0]?.targetId;
      return target ? [{ ...entry, target }] : [];
    });
    if (hits.length === 0) continue;
    const values = await session.read(hits.map(({ target }) => ({ nodeId: target, attributeId: AttributeIds.Value })));
    hits.forEach(({ index, name }, i) => {
      const value = values[i];
      if (value?.statusCode.isGoodish()) found[index]?.set(name, value.value);
    });
  }
  return found;
}

function toPropertyPath(startingNode: NodeId, name: string): BrowsePath {
  return new BrowsePath({
    startingNode,
    relativePath: new RelativePath({
      elements: [
        new RelativePathElement({
          referenceTypeId: HAS_PROPERTY,
          isInverse: false,
          includeSubtypes: true,
          targetName: new QualifiedName({ name, namespaceIndex: 0 }),
        }),
      ],
    }),
  });
}

type UnitLike = { displayName?: { text?: string | null }; description?: { text?: string | null }; unitId?: number };
type RangeLike = { low?: number; high?: number };

/** EUInformation (OPC 10000-8 §5.6.4.2) as unit; null when the value is none. */
export function toUnit(variant: Variant | undefined): Unit | null {
  const value = variant?.value as UnitLike | null | undefined;
  if (!value || typeof value !== "object" || typeof value.unitId !== "number") return null;
  return { text: value.displayName?.text ?? "", description: value.description?.text ?? null, unitId: value.unitId };
}

/** Range (OPC 10000-8 §5.6.2); null when the value is none, or is empty. */
export function toRange(variant: Variant | undefined): LiveRange | null {
  const value = variant?.value as RangeLike | null | undefined;
  if (!value || typeof value.low !== "number" || typeof value.high !== "number" || value.high <= value.low) return null;
  return { low: value.low, high: value.high };
}
