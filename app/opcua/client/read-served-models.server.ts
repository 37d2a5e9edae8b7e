/** Which models a server says it serves: its table of namespaces, and the metadata below Server/Namespaces where it has them. */
import { BrowseDirection, type ClientSession, coerceNodeId, type Variant } from "node-opcua";
import type { ServedModel } from "~/domain/as-built/as-built";
import type { EndpointClient } from "./endpoint-client.server";
import { readProperties } from "./find-properties.server";

const NAMESPACES = coerceNodeId("i=11715");
const HIERARCHICAL = coerceNodeId("i=33");

/** One entry for each namespace of the table; version and date as NamespaceMetadata says them (OPC 10000-5 §6.3.13). */
export async function readServedModels(client: EndpointClient): Promise<ServedModel[]> {
  return client.use(async (session, namespaces) => {
    const metadata = await readMetadata(session);
    return namespaces.map((modelUri) => ({ modelUri, ...metadata.get(modelUri) }));
  });
}

async function readMetadata(session: ClientSession): Promise<Map<string, Omit<ServedModel, "modelUri">>> {
  const answer = await session.browse({ nodeId: NAMESPACES, browseDirection: BrowseDirection.Forward, referenceTypeId: HIERARCHICAL, includeSubtypes: true, nodeClassMask: 1, resultMask: 63 });
  const ids = (answer.references ?? []).map((reference) => reference.nodeId);
  const found = await readProperties(session, ids, ["NamespaceUri", "NamespaceVersion", "NamespacePublicationDate"]);
  return new Map(
    found.flatMap((properties) => {
      const uri = toText(properties.get("NamespaceUri"));
      const version = toText(properties.get("NamespaceVersion"));
      const publicationDate = toDate(properties.get("NamespacePublicationDate"));
      return uri ? [[uri, { ...(version ? { version } : {}), ...(publicationDate ? { publicationDate } : {}) }] as const] : [];
    }),
  );
}

function toText(variant: Variant | undefined): string | undefined {
  return typeof variant?.value === "string" ? variant.value : undefined;
}

/** The zero of OPC UA's DateTime, 1601, says that nobody set one. */
function toDate(variant: Variant | undefined): string | undefined {
  const value: unknown = variant?.value;
  return value instanceof Date && value.getUTCFullYear() > 1601 ? value.toISOString() : undefined;
}
