/** The library's list agrees with the installed package, and everything in it can be loaded. */
import { createHash } from "node:crypto";
import { mkdtempSync, readFileSync, rmSync, writeFileSync, mkdirSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { gunzipSync } from "node:zlib";
import { nodesetCatalog } from "node-opcua-nodesets";
import { afterAll, describe, expect, it } from "vitest";
import manifest from "../../nodesets/manifest.json";
import { standardKey } from "~/domain/address-space/node-id";
import { getValue } from "~/domain/core/result";
import { readPack } from "~/domain/nodeset/pack";
import { STANDARD_ALIASES } from "~/domain/nodeset/standard-aliases";
import { describeBytes } from "~/library/describe-nodeset.server";
import { findNodeSets } from "~/library/find-nodesets.server";
import { Library } from "~/library/library.server";
import { getPackageFolder } from "~/library/published.server";

const library = new Library();
const scratch = mkdtempSync(join(tmpdir(), "ferrule-library-"));
afterAll(() => rmSync(scratch, { recursive: true, force: true }));

describe.each(manifest.nodesets)("$file", (listed) => {
  const bytes = readFileSync(join(getPackageFolder(), listed.file));

  it("is listed as it is installed", () => {
    expect(listed.sha256).toBe(createHash("sha256").update(bytes).digest("hex"));
    expect(listed.key).toBe(nodesetCatalog.find(({ xmlFile }) => xmlFile === listed.file)?.name);
  });

  it("says of itself what the list says", async () => {
    const entry = getValue(describeBytes(bytes, listed.file));
    const { nodeCount, requiredModels, ...head } = listed;
    expect(entry).toMatchObject(pickVersion(head));
    expect(entry.requiredModels.map(pickVersion)).toEqual(requiredModels);
    const published = library.list().find(({ file }) => file === listed.file);
    if (!published) throw new Error("Not listed");
    expect(getValue(await library.load(published)).nodes.size).toBe(nodeCount);
  });

  it("finds all that it requires", async () => {
    const entry = getValue(describeBytes(bytes, listed.file));
    const layers = await library.resolve(entry.requiredModels, { requiredBy: entry.modelUri });
    expect(layers.problems.filter(({ severity }) => severity === "error")).toEqual([]);
    const loaded = new Set(getValue(layers).flatMap((layer) => layer.header.models.map(({ modelUri }) => modelUri)));
    for (const { modelUri } of entry.requiredModels) expect(loaded).toContain(modelUri);
  });
});

type Versioned = { modelUri: string; version?: string; modelVersion?: string; publicationDate?: string };

function pickVersion({ modelUri, version, modelVersion, publicationDate }: Versioned): object {
  return JSON.parse(JSON.stringify({ modelUri, version, modelVersion, publicationDate })) as object;
}

describe("the library", () => {
  it("lists every file of the package", () => {
    expect(manifest.version).toBe(
      JSON.parse(readFileSync(join(getPackageFolder(), "..", "package.json"), "utf8")).version,
    );
    expect(library.list()).toHaveLength(manifest.nodesets.length);
  });

  it("knows the standard's names by the ids that the standard's file gives them", async () => {
    const entry = library.list().find(({ key }) => key === "standard");
    const layer = entry && getValue(await library.load(entry));
    for (const [name, identifier] of STANDARD_ALIASES) {
      const node = layer?.nodes.get(standardKey(identifier));
      expect([node?.browseName.name, node?.nodeClass.replace("Reference", "Data")]).toEqual([name, "DataType"]);
    }
  });

  it("hands out one layer for one content", async () => {
    const [entry] = library.list();
    if (!entry) throw new Error("Empty");
    expect(getValue(await library.load(entry))).toBe(getValue(await library.load(entry)));
  });

  it("keeps packs on disk and loads from them what the file said", async () => {
    const folder = join(scratch, "packs");
    const first = new Library();
    first.usePackFolder(folder);
    const entry = first.list().find(({ key }) => key === "iolink");
    if (!entry) throw new Error("No IO-Link");
    const read = getValue(await first.load(entry));
    const { hash, gzip } = getValue(await first.packOf(entry));
    expect(readFileSync(join(folder, `${hash}.json.gz`))).toEqual(Buffer.from(gzip));
    expect(getValue(readPack(gunzipSync(gzip).toString("utf8"))).nodes).toHaveLength(read.nodes.size);

    const second = new Library();
    second.usePackFolder(folder);
    // Without its file the NodeSet can only come from the pack.
    const moved = { ...entry, source: { kind: "file" as const, path: join(scratch, "gone.xml") } };
    const loaded = getValue(await second.load(moved));
    expect(loaded.header).toEqual(read.header);
    expect([...loaded.nodes.values()]).toEqual([...read.nodes.values()]);
    expect((await second.findPack(hash))?.gzip).toEqual(Buffer.from(gzip));
    writeFileSync(join(folder, `${hash}.json.gz`), "damaged");
    expect((await new Library().load(moved)).ok).toBe(false);
  });

  it("finds NodeSets below a folder and passes over what is none", async () => {
    const folder = join(scratch, "with");
    mkdirSync(join(folder, "deep", "er"), { recursive: true });
    writeFileSync(join(folder, "note.xml"), "<note/>");
    writeFileSync(
      join(folder, "broken.xml"),
      '<UANodeSet xmlns="http://opcfoundation.org/UA/2011/03/UANodeSet.xsd"><Models>',
    );
    writeFileSync(
      join(folder, "deep", "er", "di.xml"),
      readFileSync(join(getPackageFolder(), "Opc.Ua.Di.NodeSet2.xml")),
    );
    const found = await findNodeSets(folder);
    expect(getValue(found).map(({ modelUri }) => modelUri)).toEqual(["http://opcfoundation.org/UA/DI/"]);
    expect(found.problems.map(({ code, severity }) => [code, severity])).toEqual([["library.unreadable", "warning"]]);
    expect((await findNodeSets(join(scratch, "none"))).problems[0]?.code).toBe("library.folder-missing");
  });
});
