import { modelsFix } from "../header-fixes";
import { isSemanticVersion } from "../model-versions";
import { clause, type ModelRule } from "../rule";

export const r174: ModelRule = {
  id: "R174",
  title: "ModelVersion is a semantic version",
  severity: "error",
  clause: clause(6, "§F.2"),
  priority: 1,
  concerns: "model",
  condition:
    "ModelVersion has three numbers without leading zeros, like 1.4.0. Where it is absent a hint: files before 1.05.02 need none.",
  why: "Which of two versions is newer is decided by it; any other text cannot be compared.",
  check(ctx, report) {
    for (const { modelUri, modelVersion, version } of ctx.header.models) {
      const facts = [`ModelVersion: ${modelVersion ?? "none"}`, `Version: ${version ?? "none"}`];
      if (modelVersion === undefined)
        report({
          severity: "hint",
          attribute: "models",
          message: `The model ${modelUri} has no ModelVersion.`,
          facts,
          data: { modelUri },
        });
      else if (!isSemanticVersion(modelVersion))
        report({
          attribute: "models",
          message: `The ModelVersion “${modelVersion}” of ${modelUri} is no semantic version.`,
          facts,
          data: { modelUri },
        });
    }
  },
  fix: modelsFix("Make a semantic version of the version", (model) => {
    const numbers = (model.modelVersion ?? model.version ?? "").split(".").map((part) => Number.parseInt(part, 10));
    if (numbers.length === 0 || numbers.length > 3 || numbers.some((n) => Number.isNaN(n))) return model;
    return { ...model, modelVersion: [numbers[0] ?? 0, numbers[1] ?? 0, numbers[2] ?? 0].join(".") };
  }),
  examples: {
    good: { text: "1.0.0.", build: () => undefined },
    bad: {
      text: "1.04.",
      build: (m) => {
        m.setModel({ modelVersion: "1.04" });
        return "model";
      },
    },
  },
};
