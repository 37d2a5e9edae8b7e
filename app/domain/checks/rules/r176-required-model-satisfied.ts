import { OPC_UA_NAMESPACE } from "../../address-space/node-id";
import { describeModel, satisfies } from "../model-versions";
import { clause, type ModelRule } from "../rule";

export const r176: ModelRule = {
  id: "R176",
  title: "Required models are there in the version asked for",
  severity: "error",
  clause: clause(6, "§F.2"),
  priority: 1,
  concerns: "model",
  condition:
    "Each required model is loaded, in its minimum version: ModelVersion decides where both have one, the date where neither has. The version text is never compared.",
  why: "The model uses nodes that an older version does not have.",
  check(ctx, report) {
    const loaded = ctx.required.flatMap((layer) => layer.header.models);
    for (const model of ctx.header.models) {
      const twin = loaded.find((m) => m.modelUri === model.modelUri);
      if (twin) {
        report({
          attribute: "models",
          message: `The model ${model.modelUri} is loaded twice: here and as a required model.`,
          facts: [`Here: ${describeModel(model)}`, `Required: ${describeModel(twin)}`],
        });
      }
      for (const required of model.requiredModels) {
        const found = loaded.filter((m) => m.modelUri === required.modelUri);
        if (
          ctx.header.models.some((m) => m.modelUri === required.modelUri) ||
          found.some((m) => satisfies(m, required))
        )
          continue;
        const facts = [
          `Required: ${describeModel(required)}`,
          `Loaded: ${found.map(describeModel).join(", ") || "none"}`,
        ];
        const name = required.modelUri === OPC_UA_NAMESPACE ? "the base model" : required.modelUri;
        const message =
          found.length === 0
            ? `The required model ${name} is not loaded.`
            : `The loaded ${name} is older than ${model.modelUri} asks for.`;
        report({ attribute: "models", message, facts });
      }
    }
  },
  examples: {
    good: { text: "The base model is new enough.", build: () => undefined },
    bad: {
      text: "A base model of the far future.",
      build: (m) => {
        m.setModel({
          requiredModels: [
            {
              modelUri: OPC_UA_NAMESPACE,
              modelVersion: "9.0.0",
              publicationDate: "2099-01-01T00:00:00Z",
              requiredModels: [],
            },
          ],
        });
        return "model";
      },
    },
  },
};
