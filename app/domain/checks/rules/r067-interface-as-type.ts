import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { findTypeDefinition, isKindOf } from "../lookups";
import { findSubject, keyOf, notPossible, replaceForward } from "../fixes";
import { ok } from "../../core/result";
import { clause, type NodeRule } from "../rule";

export const r067: NodeRule = {
  id: "R067",
  title: "An Interface is never a type definition",
  severity: "error",
  clause: clause(3, "§4.10.2"),
  priority: 1,
  concerns: ["Object"],
  condition: "The type definition of an Object, a declaration too, is not BaseInterfaceType or a subtype.",
  why: "An Interface cannot be instantiated: it is applied to an Object that has a type of its own.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    if (type === undefined || !isKindOf(ctx, type, T.BaseInterfaceType)) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} has the Interface ${ctx.nameOf(type)} as its type.`,
      facts: [`HasTypeDefinition: ${ctx.describe(type)}`, "It stands below BaseInterfaceType (i=17602)."],
      data: { type },
    });
  },
  fix: {
    label: "Make it an Object of BaseObjectType that applies the Interface",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const type = keyOf(finding, "type");
      if (!node || type === undefined || type === T.BaseInterfaceType) return notPossible(finding);
      const isApplied = space.edgesFrom(node.key).some((e) => e.type === R.HasInterface && e.target === type);
      const retyped = replaceForward(space, node, R.HasTypeDefinition, T.BaseObjectType);
      if (isApplied) return ok(retyped);
      return ok([
        ...retyped,
        { kind: "addReference", source: node.key, type: R.HasInterface, target: type, declaredAt: "source" },
      ]);
    },
  },
  examples: {
    good: {
      text: "An Object that applies the Interface.",
      build: (m) => {
        m.reference(
          m.object("Pump1"),
          R.HasInterface,
          m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true }),
        );
        return undefined;
      },
    },
    bad: {
      text: "An Object that has it as its type.",
      build: (m) =>
        m.object("Pump1", { type: m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true }) }),
    },
  },
};
