import { describe, expect, it } from "vitest";
import { checkSource } from "~/components/xml/check-source";
import { listFolds } from "~/components/xml/source-folds";
import { describeNamed, findNamed, readTables } from "~/components/xml/source-names";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getValue } from "~/domain/core/result";
import { applyOperations } from "~/domain/editing/apply-operation";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { buildModel } from "../../../support/model-builder";
import { getStandardLayer } from "../../../support/published-layers";

const { space, made: type } = buildModel(
  (m) => {
    const press = m.objectType("PressType");
    m.variable("Stroke", { parent: press, rule: "Mandatory" });
    return press;
  },
  [getStandardLayer()],
);

function write(model: AddressSpace) {
  return writeNodeSet({ header: model.own.header, nodes: model.listOwnNodes() });
}

const { xml, lines } = write(space);
const textOf = (line: number) => xml.split("\n")[line - 1] ?? "";

describe("folds of the source text", () => {
  const folds = listFolds(xml);

  it("begin where nodes begin, and end with their elements", () => {
    for (const line of lines.values()) {
      const fold = folds.find((one) => one.start === line);
      expect(textOf(fold?.end ?? 0)).toMatch(/^ {2}<\/UA\w+>$/);
    }
  });

  it("never cross", () => {
    for (const a of folds) for (const b of folds) expect(a.start < b.start && b.start < a.end && a.end < b.end).toBe(false);
  });
});

describe("names in the source text", () => {
  const tables = readTables(xml);
  const line = textOf(lines.get(type) ?? 0);

  it("are those of the nodes that NodeIds stand for", () => {
    const named = findNamed(space, tables, line, line.indexOf("i=") + 1);
    expect(named?.node.key).toBe(type);
    expect(describeNamed(space, space.requireNode(type))[0]).toBe("**PressType** · ObjectType");
  });

  it("are found behind aliases, and not in plain words", () => {
    const reference = xml.split("\n").find((text) => text.includes('ReferenceType="HasModellingRule"')) ?? "";
    expect(findNamed(space, tables, reference, reference.indexOf("HasModellingRule") + 2)?.node.browseName.name).toBe("HasModellingRule");
    expect(findNamed(space, tables, reference, reference.indexOf(">i=78") + 2)?.node.browseName.name).toBe("Mandatory");
    expect(findNamed(space, tables, "    <DisplayName>Stroke</DisplayName>", 18)).toBeUndefined();
  });
});

describe("an edited source text", () => {
  it("is told by what it changes, with the findings that it brings, and applies", () => {
    const edited = xml.replace("<DisplayName>Stroke</DisplayName>", "<DisplayName>Stroke of the ram</DisplayName>");
    const checked = checkSource(space, space, edited);
    expect(checked).toMatchObject({ ok: true, counts: { added: 0, changed: 1, removed: 0 } });
    const after = getValue(applyOperations(space, checked.ok ? checked.operations : []));
    expect(write(after).xml).toBe(edited);
  });

  it("is refused with the line where it cannot be read, or names what is not there", () => {
    const broken = checkSource(space, space, xml.replace("</UAObjectType>", ""));
    expect(broken.ok).toBe(false);
    expect(broken.notes[0]?.line).toBeGreaterThan(0);
    const dangling = checkSource(space, space, xml.replace('<Reference ReferenceType="HasModellingRule">i=78', '<Reference ReferenceType="HasModellingRule">ns=1;i=77777'));
    expect(dangling.ok).toBe(false);
    expect(textOf(dangling.notes[0]?.line ?? 0)).toContain("Stroke");
  });

  it("is refused where somebody else changed the same meanwhile, and goes through where it was another place", () => {
    const edited = xml.replace("<DisplayName>Stroke</DisplayName>", "<DisplayName>Mine</DisplayName>");
    const stroke = space.listOwnNodes().find((node) => node.browseName.name === "Stroke");
    const set = (attribute: "displayName" | "description") =>
      getValue(applyOperations(space, [{ kind: "setAttribute", key: stroke?.key ?? type, attribute, value: [{ text: "Theirs" }] }]));
    expect(checkSource(space, set("displayName"), edited).ok).toBe(false);
    expect(checkSource(space, set("description"), edited)).toMatchObject({ ok: true, counts: { changed: 1 } });
  });
});
