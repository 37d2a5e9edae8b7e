/**
 * The SymbolicName for code generators (OPC 10000-6 §F.3: a letter, then letters, digits and `_`; only given where the
 * BrowseName cannot serve). undefined where the BrowseName serves. Of a placeholder `<Sensor>` it is `Sensor_Placeholder`,
 * the form that published NodeSets use.
 */
export function toSymbolicName(browseName: string): string | undefined {
  if (/^[A-Za-z][A-Za-z0-9_]*$/.test(browseName)) return undefined;
  const placeholder = /^<(.*)>$/s.exec(browseName);
  const words = (placeholder?.[1] ?? browseName)
    .normalize("NFD")
    .replace(/[^A-Za-z0-9_]+/g, "_")
    .replace(/^_+|_+$/g, "");
  const named = words === "" ? "Node" : /^[A-Za-z]/.test(words) ? words : `N_${words}`;
  return placeholder ? `${named}_Placeholder` : named;
}
