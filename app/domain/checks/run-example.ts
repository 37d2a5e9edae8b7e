/** Runs the good and the bad example of a rule, for help pages: what they hold, and what the rule says of it. */
import { AddressSpace, buildLayer, type Layer } from "../address-space/address-space";
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { ModelHeader } from "../address-space/model-header";
import { ExampleModel } from "./example-model";
import type { Finding } from "./finding";
import type { Example, Rule } from "./rule";
import { runChecks } from "./run-checks";
import type { Wiring } from "./wiring";

export type ExampleRun = {
  readonly text: string;
  readonly header: ModelHeader;
  /** All nodes, and the keys of those that the example is about: without the namespace metadata that every model has. */
  readonly nodes: readonly Node[];
  readonly shown: ReadonlySet<NodeKey>;
  /** Mappings, machines and sources, for rules about these. */
  readonly wiring?: Wiring;
  readonly findings: readonly Finding[];
};

/** `required` are the layers of namespace 0, DI and Machinery, which the examples stand on. */
export function runExample(rule: Rule, example: Example, required: readonly Layer[]): ExampleRun {
  const model = new ExampleModel();
  example.build(model);
  const shown = new Set(model.listKeys());
  const { header, nodes } = model.build();
  const space = AddressSpace.of(required, buildLayer(header, nodes));
  const wiring = model.wiring ? { wiring: model.wiring } : {};
  const findings = runChecks(space, { rules: [rule], ...wiring });
  return { text: example.text, header, nodes, shown, ...wiring, findings };
}
