import type { Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { scalar } from "../example-values";
import type { ReportFunction } from "../finding";
import {
  findModellingRule,
  findStandardProperty,
  findTypeDefinition,
  isChainLoaded,
  isKindOf,
  ofType,
} from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";
import { findValueRoot } from "../value-xml";

export const r093: NodeRule = {
  id: "R093",
  title: "States and Transitions of a state machine type",
  severity: "error",
  clause: clause(16, "§4.4.6, §4.4.9, §4.4.11, §4.4.12, §4.4.13, §4.4.19"),
  priority: 1,
  concerns: ["ObjectType"],
  condition:
    "Names and numbers of States are unique in the type, names and given numbers of Transitions too. A Transition has one FromState and one ToState, each a State. States and Transitions are components of the type without modelling rule.",
  why: "Clients follow the machine by these numbers and references; two States of one number cannot be told apart.",
  check(node, ctx, report) {
    if (!isKindOf(ctx, node.key, N.FiniteStateMachineType)) return;
    const parts = ctx.childEdges(node.key).flatMap((edge) => {
      const part = ctx.node(edge.target);
      const type = findTypeDefinition(ctx, edge.target);
      return part?.nodeClass === "Object" && type !== undefined ? [{ part, type }] : [];
    });
    const states = parts.filter((p) => isKindOf(ctx, p.type, N.StateType)).map((p) => p.part);
    const transitions = parts.filter((p) => isKindOf(ctx, p.type, N.TransitionType)).map((p) => p.part);
    checkUnique(node, states, "StateNumber", ctx, report);
    checkUnique(node, transitions, "TransitionNumber", ctx, report);
    for (const transition of transitions) checkEnds(transition, ctx, report);
    for (const part of [...states, ...transitions]) {
      const rule = findModellingRule(ctx, part.key);
      if (rule === undefined || !ctx.isOwn(part.key)) continue;
      report({
        key: part.key,
        attribute: "references",
        message: `${part.browseName.name} of ${node.browseName.name} has the modelling rule ${ctx.nameOf(rule)}.`,
        facts: ["States and Transitions stay on the type.", `HasModellingRule: ${ctx.describe(rule)}`],
      });
    }
  },
  examples: {
    good: {
      text: "Two States with two numbers.",
      build: (m) => {
        const machine = m.objectType("PressStateMachineType", { supertype: N.FiniteStateMachineType });
        addState(m, machine, "Idle", 1);
        addState(m, machine, "Running", 2);
        return undefined;
      },
    },
    bad: {
      text: "Two States with one number.",
      build: (m) => {
        const machine = m.objectType("PressStateMachineType", { supertype: N.FiniteStateMachineType });
        addState(m, machine, "Idle", 1);
        return addState(m, machine, "Running", 1);
      },
    },
  },
};

function addState(
  m: Parameters<NodeRule["examples"]["good"]["build"]>[0],
  parent: NodeKey,
  name: string,
  number: number,
): NodeKey {
  const state = m.object(name, { parent, type: N.StateType });
  m.property("0:StateNumber", { parent: state, dataType: D.UInt32, value: scalar("UInt32", number) });
  return state;
}

function checkUnique(
  type: Node,
  parts: readonly Node[],
  property: "StateNumber" | "TransitionNumber",
  ctx: CheckContext,
  report: ReportFunction,
): void {
  const seen = new Map<string, Node>();
  for (const part of parts) {
    const number = findStandardProperty(ctx, part.key, property);
    const text = number?.nodeClass === "Variable" ? findValueRoot(number.value)?.text.trim() : undefined;
    for (const [key, what] of [
      [`name ${part.browseName.name}`, `name ${part.browseName.name}`],
      [`number ${text ?? ""}`, `${property} ${text ?? ""}`],
    ] as const) {
      if (key === "number ") continue;
      const twin = seen.get(key);
      if (!twin) seen.set(key, part);
      else if (twin.key !== part.key) {
        report({
          key: ctx.isOwn(part.key) ? part.key : type.key,
          message: `${part.browseName.name} and ${twin.browseName.name} of ${type.browseName.name} have the same ${what}.`,
          facts: [`One: ${ctx.describe(twin.key)}`, `The other: ${ctx.describe(part.key)}`],
        });
      }
    }
  }
}

function checkEnds(transition: Node, ctx: CheckContext, report: ReportFunction): void {
  if (!ctx.isOwn(transition.key)) return;
  for (const [type, name] of [
    [N.FromState, "FromState"],
    [N.ToState, "ToState"],
  ] as const) {
    const ends = ofType(ctx, ctx.otherEdges(transition.key), type).map((e) => e.target);
    if (ends.length !== 1) {
      report({
        key: transition.key,
        attribute: "references",
        message: `The Transition ${transition.browseName.name} has ${ends.length} ${name} references.`,
        facts: ends.length > 0 ? ends.map((e) => `${name}: ${ctx.describe(e)}`) : [`${name} references: 0`],
      });
    }
    for (const end of ends) {
      const endType = findTypeDefinition(ctx, end);
      if (
        ctx.classOf(end) === undefined ||
        endType === undefined ||
        isKindOf(ctx, endType, N.StateType) ||
        !isChainLoaded(ctx, endType)
      )
        continue;
      report({
        key: transition.key,
        attribute: "references",
        message: `${name} of ${transition.browseName.name} is ${ctx.nameOf(end)}, which is no State.`,
        facts: [`Type of ${ctx.nameOf(end)}: ${ctx.describe(endType)}`],
      });
    }
  }
}
