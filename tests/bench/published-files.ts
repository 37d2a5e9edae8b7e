/** The five files that the reading figures are about, the base first. */
import { join } from "node:path";
import { getPackageFolder } from "~/library/published.server";

export function listBenchFiles(): string[] {
  const names = [
    "Opc.Ua.NodeSet2.xml",
    "Opc.Ua.Di.NodeSet2.xml",
    "Opc.Ua.IA.NodeSet2.xml",
    "Opc.Ua.Machinery.NodeSet2.xml",
    "Opc.Ua.IOLink.NodeSet2.xml",
  ];
  return names.map((name) => join(getPackageFolder(), name));
}
