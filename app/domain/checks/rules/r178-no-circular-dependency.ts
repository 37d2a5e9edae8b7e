import type { ModelEntry } from "../../address-space/model-header";
import { clause, type ModelRule } from "../rule";

export const r178: ModelRule = {
  id: "R178",
  title: "No circular dependency of models",
  severity: "error",
  clause: clause(6, "§F.2"),
  priority: 1,
  concerns: "model",
  condition: "Following required models never leads back to the model.",
  why: "There is no order in which the files can be loaded.",
  check(ctx, report) {
    const rows = new Map<string, ModelEntry>();
    for (const layer of ctx.required) for (const model of layer.header.models) rows.set(model.modelUri, model);
    for (const model of ctx.header.models) rows.set(model.modelUri, model);
    for (const model of ctx.header.models) {
      const way = findWayBack(model.modelUri, rows);
      if (way)
        report({
          attribute: "models",
          message: `The model ${model.modelUri} requires itself.`,
          facts: [`The way round: ${way.join(" → ")}`],
        });
    }
  },
  examples: {
    good: { text: "The base model only.", build: () => undefined },
    bad: {
      text: "The model itself.",
      build: (m) => {
        m.setModel({
          requiredModels: [...(m.header.models[0]?.requiredModels ?? []), { modelUri: m.uri, requiredModels: [] }],
        });
        return "model";
      },
    },
  },
};

function findWayBack(start: string, rows: ReadonlyMap<string, ModelEntry>): string[] | undefined {
  const from = new Map<string, string>();
  const open = [start];
  for (const at of open) {
    for (const { modelUri } of rows.get(at)?.requiredModels ?? []) {
      if (modelUri === start) return listWay(start, at, from);
      if (from.has(modelUri)) continue;
      from.set(modelUri, at);
      open.push(modelUri);
    }
  }
  return undefined;
}

function listWay(start: string, last: string, from: ReadonlyMap<string, string>): string[] {
  const way = [start];
  for (let at: string | undefined = last; at !== undefined && at !== start; at = from.get(at)) way.splice(1, 0, at);
  return [...way, start];
}
