/** `Rope braider` → `RopeBraider`: words joined, letters and figures only. */
export function toNamespacePart(name: string): string {
  return name
    .normalize("NFKD")
    .replace(/[\u0300-\u036f]/g, "")
    .split(/[^A-Za-z0-9]+/)
    .filter(Boolean)
    .map((word) => word.charAt(0).toUpperCase() + word.slice(1))
    .join("");
}

/** The URI that a new model gets unless somebody knows better: below what the team's other models share. */
export function proposeNamespaceUri(base: string, name: string): string {
  const part = toNamespacePart(name);
  return part === "" ? "" : `${base}${part}/`;
}

/** The part that the team's namespaces share up to the last slash; a domain to be replaced when there are none. */
export function findNamespaceBase(namespaceUris: readonly string[], organizationName: string): string {
  const parents = namespaceUris
    .map((uri) => uri.replace(/[^/]*\/?$/, ""))
    .filter((parent) => /^https?:\/\/[^/]+\//.test(parent));
  const counts = new Map<string, number>();
  for (const parent of parents) counts.set(parent, (counts.get(parent) ?? 0) + 1);
  const [best] = [...counts].sort((a, b) => b[1] - a[1]);
  if (best) return best[0];
  const host = toNamespacePart(organizationName).toLowerCase() || "our-works";
  return `http://${host}.example/UA/`;
}
