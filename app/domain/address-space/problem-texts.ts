export const addressSpaceProblemTexts: Readonly<Record<string, string>> = {
  "node-id.syntax": "“{text}” is not a NodeId. Write for example ns=1;i=5001 or ns=1;s=Line1.Speed.",
  "node-id.namespace-index": "“{text}” names namespace index {index}, but the file's table has {count} namespaces.",
  "node-id.numeric-range": "“{text}”: a numeric identifier ends at 4294967295.",
  "qualified-name.namespace-index":
    "“{text}” names namespace index {index}, but the file's table has {count} namespaces.",
};
