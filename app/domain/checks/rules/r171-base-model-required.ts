import { OPC_UA_NAMESPACE } from "../../address-space/node-id";
import { modelsFix, toRequirement } from "../header-fixes";
import { clause, type ModelRule } from "../rule";

export const r171: ModelRule = {
  id: "R171",
  title: "Dependency on the base model declared",
  severity: "hint",
  clause: `common practice in all published files, no source (${clause(6, "§F.2")} does not ask for it)`,
  priority: 1,
  concerns: "model",
  condition: "The model requires http://opcfoundation.org/UA/ and says in which version.",
  why: "Without it nobody knows whether the base types of an older server suffice.",
  check(ctx, report) {
    for (const model of ctx.header.models) {
      if (model.modelUri === OPC_UA_NAMESPACE) continue;
      const base = model.requiredModels.find((r) => r.modelUri === OPC_UA_NAMESPACE);
      if (base && (base.version ?? base.modelVersion ?? base.publicationDate) !== undefined) continue;
      report({
        attribute: "models",
        message: `The model ${model.modelUri} does not say which version of the base model it needs.`,
        facts: [`RequiredModels: ${model.requiredModels.map((r) => r.modelUri).join(", ") || "none"}`],
        data: { modelUri: model.modelUri },
      });
    }
  },
  fix: modelsFix("Require the base model as it is loaded", (model, _finding, space) => {
    const base = space.layers.flatMap((l) => l.header.models).find((m) => m.modelUri === OPC_UA_NAMESPACE);
    if (!base) return model;
    return {
      ...model,
      requiredModels: [toRequirement(base), ...model.requiredModels.filter((r) => r.modelUri !== OPC_UA_NAMESPACE)],
    };
  }),
  examples: {
    good: { text: "Required with version and date.", build: () => undefined },
    bad: {
      text: "Nothing required.",
      build: (m) => {
        m.setModel({ requiredModels: [] });
        return "model";
      },
    },
  },
};
