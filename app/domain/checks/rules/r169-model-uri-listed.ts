import { OPC_UA_NAMESPACE } from "../../address-space/node-id";
import { clause, type ModelRule } from "../rule";
import { headerFix } from "../header-fixes";

export const r169: ModelRule = {
  id: "R169",
  title: "The model's URI stands in the namespace table",
  severity: "error",
  clause: clause(6, "§F.2"),
  priority: 1,
  concerns: "model",
  condition: "Each ModelUri of Models stands in NamespaceUris, except that of namespace 0.",
  why: "Without its index no node of the model can be written or read.",
  check(ctx, report) {
    const { models, namespaceUris } = ctx.header;
    for (const { modelUri } of models) {
      if (modelUri === OPC_UA_NAMESPACE || namespaceUris.includes(modelUri)) continue;
      report({
        attribute: "namespaceUris",
        message: `The model ${modelUri} is not in the namespace table.`,
        facts: [`ModelUri: ${modelUri}`, `NamespaceUris: ${namespaceUris.join(", ") || "none"}`],
        data: { uri: modelUri },
      });
    }
  },
  fix: headerFix("Add it to the namespace table", "namespaceUris", (header, { data }) =>
    typeof data?.["uri"] === "string" && !header.namespaceUris.includes(data["uri"])
      ? [data["uri"], ...header.namespaceUris]
      : undefined,
  ),
  examples: {
    good: { text: "In both tables.", build: () => undefined },
    bad: {
      text: "In Models only.",
      build: (m) => {
        m.setHeader({ namespaceUris: [] });
        return "model";
      },
    },
  },
};
