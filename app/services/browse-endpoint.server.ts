/** Questions of Live to the server behind a test server's id. They read; nothing here writes or calls. */
import type { BrowsedPage, NodeCard } from "../domain/live/live-node";
import type { Result } from "../domain/core/result";
import { askEndpoint } from "./live-endpoint.server";

/** The children of a node, page by page. */
export function browseEndpoint(testServerId: string, nodeId: string, continuation: string | null): Promise<Result<BrowsedPage>> {
  return askEndpoint(testServerId, async (client) => {
    const { browseChildren } = await import("../opcua/client/browse.server");
    return browseChildren(client, nodeId, continuation);
  });
}

/** All that a node's card shows. */
export function readEndpointNode(testServerId: string, nodeId: string): Promise<Result<NodeCard>> {
  return askEndpoint(testServerId, async (client) => {
    const { readNode } = await import("../opcua/client/read-node.server");
    return readNode(client, nodeId);
  });
}

/** The nodes from Objects down to a node, so that an address can name a place deep inside. */
export function findEndpointPath(testServerId: string, nodeId: string): Promise<Result<string[]>> {
  return askEndpoint(testServerId, async (client) => {
    const { findPathTo } = await import("../opcua/client/browse.server");
    return findPathTo(client, nodeId);
  });
}
