import { getChildren } from "../members";
import { findTypeAbove, findTypeDefinition, isKindOf, listSupertypes } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";
import type { NodeKey } from "../../address-space/node-id";
import type { CheckContext } from "../check-context";
import { findStandardProperty } from "../lookups";
import { findValueRoot, textOf } from "../value-xml";
import { localizedText, scalar } from "../example-values";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { standardKey } from "../../address-space/node-id";

const FiniteStateVariableType = standardKey(2760);

export const r094: NodeRule = {
  id: "R094",
  title: "A state machine's CurrentState is a State of its type",
  severity: "error",
  clause: clause(16, "§4.4.2, Table 1, §4.4.7"),
  priority: 2,
  concerns: ["Object"],
  condition:
    "Where CurrentState of a finite state machine has a value for Number or Name, a State of the type has it. (That CurrentState exists is asked by R086.)",
  why: "Clients look the State up in the type and find none.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    if (
      type === undefined ||
      !isKindOf(ctx, type, N.FiniteStateMachineType) ||
      findTypeAbove(ctx, node.key) !== undefined
    )
      return;
    const [current] = getChildren(ctx, node.key).get("CurrentState") ?? [];
    const states = current ? listStates(ctx, type) : [];
    if (!current || states.length === 0) return;
    const property = findStandardProperty(ctx, current.key, "Number");
    const number = property?.nodeClass === "Variable" ? findValueRoot(property.value)?.text.trim() : undefined;
    const variable = ctx.node(current.key);
    const text = variable?.nodeClass === "Variable" ? textOf(findValueRoot(variable.value), "Text") : "";
    const isNumberWrong = number !== undefined && number !== "" && !states.some((s) => s.number === number);
    const isTextWrong = text !== "" && !states.some((s) => s.names.includes(text));
    if (!isNumberWrong && !isTextWrong) return;
    report({
      key: ctx.isOwn(current.key) ? current.key : node.key,
      attribute: "value",
      message: `CurrentState of ${node.browseName.name} is ${isNumberWrong ? `number ${number ?? ""}` : `“${text}”`}, which is no State of ${ctx.nameOf(type)}.`,
      facts: [
        `Type: ${ctx.describe(type)}`,
        `Its States: ${states.map((s) => `${s.names[0] ?? ""} (${s.number})`).join(", ")}`,
      ],
    });
  },
  examples: {
    good: { text: "A State of the type.", build: (m) => buildMachine(m, "Idle") },
    bad: { text: "A name that no State has.", build: (m) => buildMachine(m, "Sleeping") },
  },
};

function listStates(ctx: CheckContext, type: NodeKey): { names: string[]; number: string }[] {
  return [type, ...listSupertypes(ctx, type)].flatMap((at) =>
    ctx.childEdges(at).flatMap(({ target }) => {
      const state = ctx.node(target);
      const stateType = findTypeDefinition(ctx, target);
      if (!state || stateType === undefined || !isKindOf(ctx, stateType, N.StateType)) return [];
      const property = findStandardProperty(ctx, target, "StateNumber");
      const number = property?.nodeClass === "Variable" ? (findValueRoot(property.value)?.text.trim() ?? "") : "";
      return [{ names: [state.browseName.name, ...state.displayName.map((t) => t.text)], number }];
    }),
  );
}

function buildMachine(m: Parameters<NodeRule["examples"]["good"]["build"]>[0], name: string): NodeKey {
  const type = m.objectType("PressStateMachineType", { supertype: N.FiniteStateMachineType });
  const state = m.object("Idle", { parent: type, type: N.StateType });
  m.property("0:StateNumber", { parent: state, dataType: D.UInt32, value: scalar("UInt32", 1) });
  const parent = m.object("State", { parent: m.object("Press1"), type });
  const current = m.variable("0:CurrentState", {
    parent,
    type: FiniteStateVariableType,
    dataType: D.LocalizedText,
    value: localizedText(name),
  });
  m.property("0:Id", { parent: current, dataType: D.NodeId });
  return current;
}
