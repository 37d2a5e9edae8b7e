import { OPC_UA_NAMESPACE } from "../../address-space/node-id";
import { clause, type ModelRule } from "../rule";
import { ok } from "../../core/result";
import { notPossible } from "../fixes";
import { toRequirement } from "../header-fixes";
import { usesNamespace } from "../namespace-use";

export const r170: ModelRule = {
  id: "R170",
  title: "Every namespace is a model or a required model",
  severity: "error",
  clause: clause(6, "§F.2"),
  priority: 1,
  concerns: "model",
  condition:
    "Each entry of NamespaceUris is a Model or a RequiredModel. A RequiredModel that is not in the table is a warning: published files list indirect ones. Namespace 0 is exempt.",
  why: "A loader does not know which file to load first, and references into that namespace dangle.",
  check(ctx, report) {
    const { models, namespaceUris } = ctx.header;
    if (models.length === 0) return;
    const required = models.flatMap((m) => m.requiredModels.map((r) => r.modelUri));
    const known = new Set([OPC_UA_NAMESPACE, ...models.map((m) => m.modelUri), ...required]);
    const modelUri = models[0]?.modelUri ?? "";
    for (const uri of namespaceUris) {
      if (known.has(uri)) continue;
      report({
        attribute: "models",
        message: `The namespace ${uri} is neither the model nor a required model.`,
        facts: [`NamespaceUris: ${uri}`, `RequiredModels: ${required.join(", ") || "none"}`],
        data: { modelUri, uri },
      });
    }
    for (const uri of new Set(required)) {
      if (uri === OPC_UA_NAMESPACE || namespaceUris.includes(uri)) continue;
      report({
        severity: "warning",
        attribute: "models",
        message: `The required model ${uri} is not in the namespace table.`,
        facts: [`RequiredModel: ${uri}`, `NamespaceUris: ${namespaceUris.join(", ") || "none"}`],
      });
    }
  },
  fix: {
    label: "Require the model that is loaded, or drop a namespace that nothing uses",
    apply(space, finding) {
      const uri = finding.data?.["uri"];
      const { header } = space.own;
      if (typeof uri !== "string" || !header.namespaceUris.includes(uri)) return notPossible(finding);
      const loaded = space.layers.flatMap((l) => l.header.models).find((m) => m.modelUri === uri);
      const [first, ...others] = header.models;
      if (loaded && first) {
        const models = [{ ...first, requiredModels: [...first.requiredModels, toRequirement(loaded)] }, ...others];
        return ok([{ kind: "setHeader", field: "models", value: models }]);
      }
      const isUsed = space.listOwnNodes().some((node) => usesNamespace(node, uri));
      if (isUsed) return notPossible(finding);
      return ok([{ kind: "setHeader", field: "namespaceUris", value: header.namespaceUris.filter((u) => u !== uri) }]);
    },
  },
  examples: {
    good: { text: "Only the model's own namespace.", build: () => undefined },
    bad: {
      text: "A namespace that nobody requires.",
      build: (m) => {
        m.setHeader({ namespaceUris: [m.uri, "http://example.org/UA/Parts/"] });
        return "model";
      },
    },
  },
};
