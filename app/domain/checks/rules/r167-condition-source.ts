import type { NodeKey } from "../../address-space/node-id";
import { findStandardProperty, findTypeDefinition, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";
import { findValueRoot, textOf } from "../value-xml";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { toKey } from "../arguments";
import type { ExampleModel } from "../example-model";
import { nodeId } from "../example-values";

export const r167: NodeRule = {
  id: "R167",
  title: "A condition names its source",
  severity: "error",
  clause: `${clause(9, "§5.5.2, §5.7.2, §5.8.2, §5.12")}, ${clause(3, "§6.4.4.4.1")}`,
  priority: 2,
  concerns: ["Object"],
  condition:
    "Where SourceNode of a condition has a value, it is the source of the HasCondition. (That the Mandatory members exist is asked by R086.)",
  why: "Clients group alarms by SourceNode and show this one at another machine.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    if (type === undefined || !isKindOf(ctx, type, N.ConditionType)) return;
    const property = findStandardProperty(ctx, node.key, "SourceNode");
    const text = property?.nodeClass === "Variable" ? textOf(findValueRoot(property.value), "Identifier") : "";
    const named = text === "" ? undefined : toKey(ctx, text);
    const sources = ctx
      .otherEdgesTo(node.key)
      .filter((e) => ctx.closure(N.HasCondition).has(e.type))
      .map((e) => e.source);
    if (named === undefined || sources.length === 0 || sources.includes(named)) return;
    report({
      message: `SourceNode of ${node.browseName.name} is ${ctx.nameOf(named)}, but ${ctx.nameOf(sources[0] ?? named)} has the condition.`,
      facts: [`SourceNode: ${ctx.describe(named)}`, ...sources.map((s) => `HasCondition from ${ctx.describe(s)}`)],
    });
  },
  examples: {
    good: { text: "SourceNode is the source.", build: (m) => void addAlarm(m, true) },
    bad: { text: "SourceNode is another node.", build: (m) => addAlarm(m, false) },
  },
};

function addAlarm(m: ExampleModel, isRight: boolean): NodeKey {
  const type = m.objectType("TankType");
  const level = m.variable("Level", { parent: type, rule: "Mandatory" });
  const pressure = m.variable("Pressure", { parent: type, rule: "Mandatory" });
  const condition = m.objectType("OverflowConditionType", { supertype: N.ConditionType });
  const alarm = m.object("Overflow", { parent: type, type: condition, rule: "Mandatory" });
  m.reference(level, N.HasCondition, alarm);
  m.property("0:SourceNode", {
    parent: alarm,
    dataType: D.NodeId,
    rule: "Mandatory",
    value: nodeId(isRight ? level : pressure),
  });
  return alarm;
}
