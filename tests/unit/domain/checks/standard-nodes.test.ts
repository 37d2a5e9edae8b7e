import { expect, test } from "vitest";
import { StandardNode } from "~/domain/checks/standard-nodes";
import { getStandardLayer } from "../../../support/published-layers";

/** Compared with Opc.Ua.NodeSet2.xml of the npm package node-opcua-nodesets. */
test.each(Object.entries(StandardNode))("%s has its number in namespace 0", (name, key) => {
  expect(getStandardLayer().nodes.get(key)?.browseName.name).toBe(name);
});
