import { attributeFix, keyOf, REMOVED } from "../fixes";
import { getDataType, hasValueAttributes } from "../../address-space/node";
import { standardKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { clause, type NodeRule } from "../rule";
import { listValueBases } from "../value-bases";

export const r095: NodeRule = {
  id: "R095",
  title: "DataType attribute resolves",
  severity: "error",
  clause: `${clause(3, "§5.6.2, Table 13, §5.6.5, Table 14, §5.8.3")}, UANodeSet.xsd`,
  priority: 1,
  concerns: ["Variable", "VariableType"],
  condition:
    "The DataType is not null and names a DataType; left out it is BaseDataType. Abstract DataTypes are legal.",
  why: "Clients cannot decode or show a value whose type they cannot find, and servers refuse to load the Variable.",
  check(node, ctx, report) {
    if (!hasValueAttributes(node) || node.dataType === undefined) return;
    const { dataType } = node;
    const type = ctx.node(dataType);
    if (type?.nodeClass === "DataType") return;
    const attribute = "dataType";
    const name = node.browseName.name;
    const wider = listValueBases(node, ctx)
      .map(({ base }) => getDataType(base))
      .find((key) => key !== D.BaseDataType && ctx.classOf(key) === "DataType");
    const data = { wider: wider ?? "" };
    if (type) {
      report({
        attribute,
        message: `The DataType of ${name} is ${type.browseName.name}, which is no DataType.`,
        facts: [`DataType attribute: ${ctx.describe(dataType)}`, `Its NodeClass: ${type.nodeClass}`],
        data,
      });
      return;
    }
    const namespace = ctx.namespaceOf(dataType);
    if (dataType !== standardKey(0) && namespace !== undefined && !ctx.isNamespaceLoaded(namespace)) return;
    report({
      attribute,
      message:
        dataType === standardKey(0)
          ? `The DataType of ${name} is null.`
          : `The DataType ${dataType} of ${name} does not exist.`,
      facts: [
        `DataType attribute: ${dataType}`,
        namespace === undefined
          ? "The text is no NodeId."
          : `The namespace ${namespace} is loaded and has no such node.`,
      ],
      data,
    });
  },
  fix: attributeFix(
    "Take the DataType of the VariableType or declaration, else leave it open",
    "dataType",
    (node, finding) =>
      "dataType" in node && node.dataType !== undefined ? (keyOf(finding, "wider") ?? REMOVED) : undefined,
  ),
  examples: {
    good: { text: "Double.", build: (m) => m.variable("Speed", { parent: m.object("Pump1") }) },
    bad: {
      text: "An identifier that names no node.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), dataType: standardKey(4294967290) }),
    },
  },
};
