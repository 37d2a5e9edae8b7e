import { parseNodeId, standardKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { readArguments, toKey } from "../arguments";
import { argumentList } from "../example-values";
import { clause, type NodeRule } from "../rule";

export const r160: NodeRule = {
  id: "R160",
  title: "DataType and rank of arguments",
  severity: "error",
  clause: `${clause(3, "§8.6, Table 28")}, ${clause(6, "§5.1.11, §5.3.5")}`,
  priority: 1,
  concerns: ["Method"],
  needs: ["children"],
  condition:
    "Each argument names a DataType; ArrayDimensions is empty for ranks up to 0, and empty or of as many entries as the rank above. A ValueRank that is left out means 0, one or more dimensions: a hint.",
  why: "Clients cannot build the call, or send a list where a single value is meant.",
  check(node, ctx, report) {
    for (const property of ["InputArguments", "OutputArguments"] as const) {
      for (const { name, dataType, valueRank, dimensions } of readArguments(ctx, node.key, property)) {
        const what = `The argument ${name} of ${node.browseName.name}`;
        const parsed = parseNodeId(dataType, []);
        const key = toKey(ctx, dataType);
        const isMissing =
          dataType === "" || (parsed.ok && key === undefined && ctx.isNamespaceLoaded(parsed.value.namespaceUri));
        if (isMissing || (key !== undefined && ctx.classOf(key) !== "DataType")) {
          report({ message: `${what} has no DataType that exists.`, facts: [`DataType: ${dataType || "left out"}`] });
        }
        const rank = valueRank ?? 0;
        const facts = [
          `ValueRank: ${String(rank).replace("-", "−")}${valueRank === undefined ? " (left out)" : ""}`,
          `ArrayDimensions: ${dimensions.join(",") || "none"}`,
        ];
        if (dimensions.length > 0 && dimensions.length !== Math.max(rank, 0))
          report({ message: `${what} has ArrayDimensions that do not fit its rank.`, facts });
        if (valueRank === undefined)
          report({ severity: "hint", message: `${what} has no ValueRank, which means one or more dimensions.`, facts });
      }
    }
  },
  examples: {
    good: {
      text: "A scalar Double.",
      build: (m) =>
        void m.property("0:InputArguments", {
          parent: m.method("Start", { parent: m.object("Pump1") }),
          dataType: D.Argument,
          valueRank: 1,
          value: argumentList({ name: "Speed", dataType: D.Double }),
        }),
    },
    bad: {
      text: "A DataType that does not exist.",
      build: (m) => {
        const parent = m.method("Start", { parent: m.object("Pump1") });
        m.property("0:InputArguments", {
          parent,
          dataType: D.Argument,
          valueRank: 1,
          value: argumentList({ name: "Speed", dataType: standardKey(4294967290) }),
        });
        return parent;
      },
    },
  },
};
