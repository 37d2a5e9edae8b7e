import { headerFix } from "../header-fixes";
import type { ModelRule } from "../rule";

export const r173: ModelRule = {
  id: "R173",
  title: "No unused namespace",
  severity: "hint",
  clause: "common practice, no source",
  priority: 2,
  concerns: "model",
  condition: "Each entry of the namespace table is used by an id, a name or a value of the model.",
  why: "A left-over entry keeps a dependency alive that nothing needs.",
  check(ctx, report) {
    const own = new Set(ctx.header.models.map((m) => m.modelUri));
    for (const uri of ctx.header.namespaceUris) {
      if (own.has(uri) || ctx.isNamespaceUsed(uri)) continue;
      report({
        attribute: "namespaceUris",
        message: `The namespace ${uri} is not used.`,
        facts: [`NamespaceUris: ${uri}`, "Ids, names and values of the model with it: 0"],
        data: { uri },
      });
    }
  },
  fix: headerFix("Remove it from the table", "namespaceUris", (header, { data }) =>
    header.namespaceUris.includes(String(data?.["uri"]))
      ? header.namespaceUris.filter((uri) => uri !== data?.["uri"])
      : undefined,
  ),
  examples: {
    good: { text: "Only what is used.", build: () => undefined },
    bad: {
      text: "One that nothing uses.",
      build: (m) => {
        m.setHeader({ namespaceUris: [m.uri, "http://example.org/UA/Parts/"] });
        m.setModel({
          requiredModels: [
            ...(m.header.models[0]?.requiredModels ?? []),
            { modelUri: "http://example.org/UA/Parts/", requiredModels: [] },
          ],
        });
        return "model";
      },
    },
  },
};
