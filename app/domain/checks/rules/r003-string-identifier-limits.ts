import { formatNodeId } from "../../address-space/node-id";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { listControlCharacters } from "../texts";

const LIMIT = 4096;

export const r003: NodeRule = {
  id: "R003",
  title: "Limits of text and opaque identifiers",
  severity: "error",
  clause: clause(3, "§8.2.4"),
  priority: 2,
  concerns: ALL_CLASSES,
  needs: ["text id"],
  condition:
    "A text identifier has at most 4096 characters and no control characters, an opaque one at most 4096 bytes.",
  why: "Longer identifiers are refused by servers, and invisible characters make two identifiers look alike.",
  check({ nodeId, browseName }, _ctx, report) {
    if (typeof nodeId.identifier !== "string") return;
    const size =
      nodeId.type === "b"
        ? Math.floor((nodeId.identifier.replace(/=+$/, "").length * 3) / 4)
        : nodeId.identifier.length;
    const unit = nodeId.type === "b" ? "bytes" : "characters";
    if (nodeId.type !== "g" && size > LIMIT) {
      report({
        attribute: "nodeId",
        message: `The identifier of ${browseName.name} has ${size} ${unit}.`,
        facts: [`Limit: ${LIMIT} ${unit}`],
      });
    }
    const controls = nodeId.type === "s" ? listControlCharacters(nodeId.identifier) : [];
    if (controls.length > 0) {
      report({
        attribute: "nodeId",
        message: `The identifier of ${browseName.name} holds control characters.`,
        facts: [`Found: ${controls.join(", ")}`, `NodeId: ${JSON.stringify(formatNodeId(nodeId))}`],
      });
    }
  },
  examples: {
    good: {
      text: "A short text.",
      build: (m) => m.object("Line1", { nodeId: { namespaceUri: m.uri, type: "s", identifier: "Line1.Temp" } }),
    },
    bad: {
      text: "A text with a tab.",
      build: (m) => m.object("Line1", { nodeId: { namespaceUri: m.uri, type: "s", identifier: "Line1\tTemp" } }),
    },
  },
};
