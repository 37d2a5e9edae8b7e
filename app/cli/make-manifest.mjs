/**
 * Writes nodesets/manifest.json and app/domain/nodeset/standard-aliases.ts from the installed npm package
 * node-opcua-nodesets. Run it with `npm run manifest` after the package changed; a conformance test compares the result
 * with what Ferrule's own reader finds in the files. It shares no code with that reader on purpose.
 */
import { createHash } from "node:crypto";
import { readdirSync, readFileSync, writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { dirname, join, relative } from "node:path";
import { fileURLToPath } from "node:url";
import { SaxesParser } from "saxes";

const require = createRequire(import.meta.url);
const root = join(dirname(fileURLToPath(import.meta.url)), "..", "..");
const packageFolder = join(dirname(require.resolve("node-opcua-nodesets")), "..");
const folder = join(packageFolder, "nodesets");
const BASE = "http://opcfoundation.org/UA/";
const CLASSES = /^UA(Object|Variable|Method|View|ObjectType|VariableType|DataType|ReferenceType)$/;

const { nodesetCatalog } = require("node-opcua-nodesets");
const { version } = JSON.parse(readFileSync(join(packageFolder, "package.json"), "utf8"));

function listFiles(below) {
  return readdirSync(below, { withFileTypes: true }).flatMap((entry) => {
    const path = join(below, entry.name);
    if (entry.isDirectory()) return listFiles(path);
    return entry.name.endsWith(".xml") ? [path] : [];
  });
}

function describe(path) {
  const bytes = readFileSync(path);
  const file = relative(folder, path).replaceAll("\\", "/");
  const uris = [];
  const models = [];
  const open = [];
  const names = [];
  let nodeCount = 0;
  let text = "";
  const parser = new SaxesParser();
  parser.on("error", (error) => {
    throw new Error(`${file}: ${error.message}`);
  });
  parser.on("text", (piece) => (text += piece));
  parser.on("opentag", ({ name, attributes }) => {
    text = "";
    open.push(name);
    if (CLASSES.test(name) && open.length === 2) {
      nodeCount++;
      if (name === "UADataType" || name === "UAReferenceType") names.push([attributes.BrowseName, attributes.NodeId]);
    }
    if (name === "Model" && open.length === 3) models.push({ ...pick(attributes), requiredModels: [] });
    if (name === "RequiredModel" && open.length === 4) models.at(-1).requiredModels.push(pick(attributes));
  });
  parser.on("closetag", ({ name }) => {
    if (name === "Uri" && open.at(-2) === "NamespaceUris") uris.push(text.trim());
    open.pop();
  });
  parser.write(bytes.toString("utf8").replace(/^\uFEFF/, "")).close();
  if (models.length > 1) throw new Error(`${file} defines ${models.length} models`);
  // Files older than the Models table name what they need in their namespace table only.
  const [own, ...others] = uris;
  const model = models[0] ?? { modelUri: own, requiredModels: [BASE, ...others].map((modelUri) => ({ modelUri })) };
  const { requiredModels, ...rest } = model;
  const key = nodesetCatalog.find((entry) => entry.xmlFile === file)?.name;
  const sha256 = createHash("sha256").update(bytes).digest("hex");
  return {
    entry: { file, ...(key ? { key } : {}), ...rest, nodeCount, size: bytes.length, sha256, requiredModels },
    names,
  };
}

function pick({ ModelUri, Version, ModelVersion, PublicationDate }) {
  return {
    modelUri: ModelUri,
    ...(Version === undefined ? {} : { version: Version }),
    ...(ModelVersion === undefined ? {} : { modelVersion: ModelVersion }),
    ...(PublicationDate === undefined ? {} : { publicationDate: PublicationDate }),
  };
}

function writeAliases(names) {
  const rows = names.map(([name, id]) => [name, Number(id.slice(2))]).sort((a, b) => a[1] - b[1]);
  const head = [
    "/**",
    " * @generated from Opc.Ua.NodeSet2.xml of the npm package node-opcua-nodesets by app/cli/make-manifest.mjs.",
    " * Names of the standard's ReferenceTypes and DataTypes: what files use as aliases, also without defining them.",
    " */",
    "export const STANDARD_ALIASES: ReadonlyMap<string, number> = new Map([",
  ];
  const lines = rows.map(([name, id]) => `  ["${name}", ${id}],`);
  writeFileSync(join(root, "app/domain/nodeset/standard-aliases.ts"), [...head, ...lines, "]);", ""].join("\n"));
}

const described = listFiles(folder).map(describe);
const nodesets = described.map(({ entry }) => entry).sort((a, b) => (a.file < b.file ? -1 : 1));
const manifest = { package: "node-opcua-nodesets", version, nodesets };
writeFileSync(join(root, "nodesets/manifest.json"), `${JSON.stringify(manifest, null, 2)}\n`);
writeAliases(described.find(({ entry }) => entry.file === "Opc.Ua.NodeSet2.xml").names);
console.log(`${nodesets.length} NodeSets of ${manifest.package} ${version}`);
