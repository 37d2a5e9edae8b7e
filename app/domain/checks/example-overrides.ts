/** A member that a subtype overrides, for examples of rules about overrides. */
import type { NodeKey } from "../address-space/node-id";
import type { ExampleModel, RuleName } from "./example-model";

/** `PumpType` declares `Speed` by one modelling rule, `FastPumpType` overrides it by another; answers the override. */
export function addOverride(m: ExampleModel, declared: RuleName, overriding: RuleName): NodeKey {
  const pump = m.objectType("PumpType");
  m.variable("Speed", { parent: pump, rule: declared });
  return m.variable("Speed", { parent: m.objectType("FastPumpType", { supertype: pump }), rule: overriding });
}
