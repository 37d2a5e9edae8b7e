import { clause, type ModelRule } from "../rule";

export const r021: ModelRule = {
  id: "R021",
  title: "URIs that differ only in letter case or closing slash",
  severity: "hint",
  clause: `common practice, no source (${clause(3, "§4.2, §8.2.2")}: compared letter by letter, so these are two namespaces)`,
  priority: 2,
  concerns: "model",
  condition:
    "No two namespace URIs of the model and its required models are equal but for letter case and closing slashes.",
  why: "Nearly always one of the two is a slip, and the nodes of the one are not found under the other.",
  check(ctx, report) {
    const { header } = ctx;
    const uris = new Set([
      ...header.namespaceUris,
      ...header.models.flatMap((m) => [m.modelUri, ...m.requiredModels.map((r) => r.modelUri)]),
    ]);
    for (const layer of ctx.required) for (const m of layer.header.models) uris.add(m.modelUri);
    const seen = new Map<string, string>();
    for (const uri of uris) {
      const folded = uri.toLowerCase().replace(/\/+$/, "");
      const twin = seen.get(folded);
      if (twin === undefined) seen.set(folded, uri);
      else {
        report({
          attribute: "namespaceUris",
          message: `The URIs ${twin} and ${uri} differ in letter case or closing slash only.`,
          facts: [`One: ${twin}`, `The other: ${uri}`],
        });
      }
    }
  },
  examples: {
    good: { text: "One spelling.", build: () => undefined },
    bad: {
      text: "The own URI once with and once without its closing slash.",
      build: (m) => {
        m.setHeader({ namespaceUris: [m.uri, m.uri.slice(0, -1)] });
        m.setModel({
          requiredModels: [
            ...(m.header.models[0]?.requiredModels ?? []),
            { modelUri: m.uri.slice(0, -1), requiredModels: [] },
          ],
        });
        return "model";
      },
    },
  },
};
