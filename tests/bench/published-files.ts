/** The five files that the reading figures are about, the base first. */
import { copyFileSync, mkdirSync } from "node:fs";
import { join } from "node:path";
import { getPackageFolder } from "~/library/published.server";

const NAMES = [
  "Opc.Ua.NodeSet2.xml",
  "Opc.Ua.Di.NodeSet2.xml",
  "Opc.Ua.IA.NodeSet2.xml",
  "Opc.Ua.Machinery.NodeSet2.xml",
  "Opc.Ua.IOLink.NodeSet2.xml",
];

/**
 * Copies them into a folder of their own. In the package lie precompiled images beside the XML, which node-opcua's loader
 * takes instead; here both sides read XML.
 */
export function copyBenchFiles(scratch: string): string[] {
  const folder = join(scratch, "xml");
  mkdirSync(folder, { recursive: true });
  return NAMES.map((name) => {
    const path = join(folder, name);
    copyFileSync(join(getPackageFolder(), name), path);
    return path;
  });
}
