/** DataTypes and the built-in types they are encoded as: OPC 10000-3 §8, OPC 10000-5 §12; ids of Opc.Ua.NodeSet2.xml. */
import { readFileSync } from "node:fs";
import { nodesets } from "node-opcua-nodesets";
import { describe, expect, it } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { standardKey } from "~/domain/address-space/node-id";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { findBuiltInType } from "~/domain/simulation/find-built-in-type";

const { header, nodes } = getValue(readNodeSet(readFileSync(nodesets.standard, "utf8")));
const space = AddressSpace.of([], buildLayer(header, nodes));

describe("the built-in type of a DataType", () => {
  it.each([
    [1, "Boolean"],
    [10, "Float"],
    [290, "Double"],
    [294, "DateTime"],
    [295, "String"],
    [256, "Int32"],
    [884, "ExtensionObject"],
    [887, "ExtensionObject"],
    [26, "Double"],
    [27, "Int32"],
    [28, "UInt32"],
    [24, "Variant"],
    [30, "ByteString"],
  ] as const)("of i=%i is %s", (id, expected) => {
    expect(findBuiltInType(space, standardKey(id))).toBe(expected);
  });

  it("of a DataType that is not loaded claims nothing", () => {
    expect(findBuiltInType(space, standardKey(99999999))).toBe("Variant");
  });
});
