import { clause, type ModelRule } from "../rule";

const PLACEHOLDER =
  /yourorgani[sz]ation|your-?company|urn:unconfigured|^http:\/\/(?:www\.)?(?:company|vendor|test)\.(?:com|org)\b/i;

export const r020: ModelRule = {
  id: "R020",
  title: "Form of the namespace URI",
  severity: "warning",
  clause: `${clause(3, "§4.2")}, OPC 11030 v1.03 §2.5 (white paper); placeholders: common practice, no source`,
  priority: 2,
  concerns: "model",
  condition:
    "The URI of the model begins with http:// or tag:, has scheme and host in small letters, no percent escapes, ends with a short name, and is nobody's placeholder.",
  why: "The URI is the identity of every node for good: one that belongs to somebody else, or that is read in two spellings, cannot be changed later.",
  check(ctx, report) {
    for (const { modelUri } of ctx.header.models) {
      const trouble = findTrouble(modelUri);
      if (trouble === undefined) continue;
      report({
        attribute: "models",
        message: `The namespace URI ${modelUri} ${trouble}.`,
        facts: [`ModelUri: ${modelUri}`],
      });
    }
  },
  examples: {
    good: { text: "A page of one's own with the name of the model.", build: () => undefined },
    bad: {
      text: "A placeholder that was never replaced.",
      build: (m) => {
        const uri = "http://yourorganisation.org/Press/";
        m.setHeader({ namespaceUris: [uri] });
        m.setModel({ modelUri: uri });
        return "model";
      },
    },
  },
};

function findTrouble(uri: string): string | undefined {
  if (PLACEHOLDER.test(uri)) return "is a placeholder";
  if (uri.includes("%")) return "has percent escapes";
  const parts = /^([A-Za-z][A-Za-z0-9+.-]*):(?:\/\/([^/]*))?(.*)$/.exec(uri);
  if (!parts) return "is no URI with a scheme";
  const [, scheme = "", host = "", path = ""] = parts;
  if (scheme !== scheme.toLowerCase() || host !== host.toLowerCase()) return "has capital letters in scheme or host";
  if (scheme !== "http" && scheme !== "https" && scheme !== "tag" && scheme !== "urn")
    return `has the unusual scheme ${scheme}`;
  return path.replace(/\/+$/, "") === "" ? "does not end with the name of the model" : undefined;
}
