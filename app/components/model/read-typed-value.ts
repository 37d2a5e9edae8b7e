/** Values of nodes as Variants, read once: a node's value is the same object until somebody changes it. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findProperty } from "~/domain/address-space/browse";
import { hasValueAttributes, type Node, type XmlText } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { SpaceDataTypes } from "~/domain/nodeset/values/data-type-shapes";
import { readValue } from "~/domain/nodeset/values/read-value";
import type { Variant } from "~/domain/nodeset/values/variant";

const variants = new WeakMap<XmlText, { readonly variant: Variant | undefined }>();
const lookups = new WeakMap<AddressSpace, SpaceDataTypes>();

export function getDataTypes(space: AddressSpace): SpaceDataTypes {
  let types = lookups.get(space);
  if (!types) {
    types = new SpaceDataTypes(space);
    lookups.set(space, types);
  }
  return types;
}

/** Undefined where there is no value, or none that can be read. */
export function readTypedValue(space: AddressSpace, node: Node | undefined): Variant | undefined {
  const value = node && hasValueAttributes(node) ? node.value : undefined;
  if (!value) return undefined;
  let known = variants.get(value);
  if (!known) {
    const read = readValue(value, getDataTypes(space));
    known = { variant: read.ok ? read.value : undefined };
    variants.set(value, known);
  }
  return known.variant;
}

/** The value of a Property of namespace 0. */
export function readPropertyValue(space: AddressSpace, owner: NodeKey, name: string): Variant | undefined {
  return readTypedValue(space, findProperty(space, owner, name));
}
