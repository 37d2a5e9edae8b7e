import { StandardDataType as D } from "../../address-space/standard-ids";
import { findSubject, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { listSupertypes } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { addStructure } from "../structures";

export const r150: NodeRule = {
  id: "R150",
  title: "A Union derives directly from Union",
  severity: "error",
  clause: `${clause(3, "§8.41")}, ${clause(6, "§F.12")}`,
  priority: 1,
  concerns: ["DataType"],
  condition: "IsUnion is true exactly for DataTypes whose supertype is Union (i=12756); a Union has no subtypes.",
  why: "The flag says how values are encoded, the supertype what they are: when they differ, stacks read differently.",
  check(node, ctx, report) {
    if (node.nodeClass !== "DataType") return;
    const above = listSupertypes(ctx, node.key);
    const isBelow = above.includes(D.Union);
    const isUnion = node.definition?.isUnion === true;
    const name = node.browseName.name;
    const facts = [`Supertypes: ${above.map((t) => ctx.nameOf(t)).join(", ") || "none"}`, `IsUnion: ${isUnion}`];
    if (isBelow && above[0] !== D.Union)
      report({
        attribute: "references",
        message: `${name} derives from the Union ${ctx.nameOf(above[0] ?? D.Union)}, which can have no subtypes.`,
        facts,
      });
    else if (isUnion && !isBelow && above.length > 0)
      report({
        attribute: "definition",
        message: `${name} is marked as a Union but does not derive from Union.`,
        facts,
        data: { isUnion: 0 },
      });
    else if (isBelow && node.definition && !isUnion && node.definition.fields.length > 0)
      report({
        attribute: "definition",
        message: `${name} derives from Union but is not marked as one.`,
        facts,
        data: { isUnion: 1 },
      });
  },
  fix: {
    label: "Mark it as what it derives from",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const wanted = finding.data?.["isUnion"];
      if (node?.nodeClass !== "DataType" || !node.definition || wanted === undefined) return notPossible(finding);
      const { isUnion: _dropped, ...rest } = node.definition;
      return ok([setAttribute(node.key, "definition", wanted === 1 ? { ...rest, isUnion: true } : rest)]);
    },
  },
  examples: {
    good: {
      text: "Marked, and below Union.",
      build: (m) =>
        addStructure(
          m,
          "NumberOrText",
          [
            { name: "Number", dataType: D.Double },
            { name: "Text", dataType: D.String },
          ],
          { supertype: D.Union, isUnion: true },
        ),
    },
    bad: {
      text: "Marked, but below Structure.",
      build: (m) =>
        addStructure(
          m,
          "NumberOrText",
          [
            { name: "Number", dataType: D.Double },
            { name: "Text", dataType: D.String },
          ],
          { isUnion: true },
        ),
    },
  },
};
