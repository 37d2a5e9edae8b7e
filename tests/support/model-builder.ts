/** Small models on top of the published namespace 0, for tests that say only what they are about. */
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { ExampleModel } from "~/domain/checks/example-model";
import { getStandardLayer } from "./published-layers";

export { ExampleModel } from "~/domain/checks/example-model";

export type BuiltModel<T> = { readonly space: AddressSpace; readonly made: T; readonly model: ExampleModel };

/** Builds the model that `write` describes; `made` is what it answers, usually keys of nodes. */
export function buildModel<T>(
  write: (m: ExampleModel) => T,
  required: readonly Layer[] = [getStandardLayer()],
): BuiltModel<T> {
  const model = new ExampleModel();
  const made = write(model);
  const { header, nodes } = model.build();
  return { space: AddressSpace.of(required, buildLayer(header, nodes)), made, model };
}

export type { NodeKey };
