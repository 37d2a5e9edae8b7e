import { modelsFix } from "../header-fixes";
import { clause, type ModelRule } from "../rule";
import { OPC_UA_NAMESPACE } from "../../address-space/node-id";

export const r177: ModelRule = {
  id: "R177",
  title: "Content of a RequiredModel",
  severity: "error",
  clause: clause(6, "§F.2"),
  priority: 1,
  concerns: "model",
  condition:
    "A RequiredModel has no RequiredModel of its own, no RolePermissions and no AccessRestrictions. A minimum with ModelVersion or date alone is a hint.",
  why: "Loaders refuse the nested rows, or take their permissions for those of the model.",
  check(ctx, report) {
    for (const { modelUri, requiredModels } of ctx.header.models) {
      for (const required of requiredModels) {
        const surplus = [
          ...(required.requiredModels.length > 0 ? ["RequiredModel"] : []),
          ...(required.rolePermissions ? ["RolePermissions"] : []),
          ...(required.accessRestrictions === undefined ? [] : ["AccessRestrictions"]),
        ];
        if (surplus.length > 0)
          report({
            attribute: "models",
            message: `The RequiredModel ${required.modelUri} has ${surplus.join(", ")}.`,
            facts: [`Of the model ${modelUri}`],
            data: { modelUri },
          });
        else if (required.modelVersion !== undefined && required.publicationDate === undefined) {
          report({
            severity: "hint",
            attribute: "models",
            message: `The minimum of ${required.modelUri} has no PublicationDate.`,
            facts: [`ModelVersion: ${required.modelVersion}`],
          });
        }
      }
    }
  },
  fix: modelsFix("Strip the surplus", (model) => ({
    ...model,
    requiredModels: model.requiredModels.map(({ rolePermissions: _r, accessRestrictions: _a, ...rest }) => ({
      ...rest,
      requiredModels: [],
    })),
  })),
  examples: {
    good: { text: "URI, version and date.", build: () => undefined },
    bad: {
      text: "AccessRestrictions of another model.",
      build: (m) => {
        m.setModel({
          requiredModels: [
            {
              modelUri: OPC_UA_NAMESPACE,
              publicationDate: "2020-01-01T00:00:00Z",
              accessRestrictions: 3,
              requiredModels: [],
            },
          ],
        });
        return "model";
      },
    },
  },
};
