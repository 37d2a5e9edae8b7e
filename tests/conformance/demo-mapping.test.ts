/**
 * The demo's mapping: the committed document is what the builder makes, it names members that the type has, and it turns
 * frames into the values worked out by hand. `npx vitest run --project conformance demo-mapping -u` writes it anew.
 */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { listChildren } from "~/domain/address-space/browse";
import { formatNodeId, numericNodeId, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import { getValue, ok } from "~/domain/core/result";
import { findLayout, readMappingDocument, writeMappingDocument } from "~/domain/deliver/mapping-document";
import { parseHex } from "~/domain/mapping/bits";
import { findConversion } from "~/domain/mapping/find-conversion";
import { MappingRunner } from "~/domain/mapping/mapping-runner";
import { planMapping, toChannelKey } from "~/domain/mapping/plan-mapping";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { makeBraiderMapping } from "../support/demo-models/braider-mapping";
import { getPublishedLayer } from "../support/published-layers";
import { projectRoot } from "../support/source-files";

const BRAIDER = "http://merrow.example/UA/RopeBraider/";
const file = join(projectRoot, "nodesets/demo/rope-braider.mapping.json");

function nodeIdOf(target: string): string {
  const { header, nodes } = getValue(
    readNodeSet(readFileSync(join(projectRoot, "nodesets/demo/merrow-rope-braider.NodeSet2.xml"), "utf8")),
  );
  const published = ["Opc.Ua.NodeSet2.xml", "Opc.Ua.Di.NodeSet2.xml", "Opc.Ua.IA.NodeSet2.xml"];
  const space = AddressSpace.of(published.map(getPublishedLayer), buildLayer(header, nodes));
  let at: NodeKey = toNodeKey(numericNodeId(BRAIDER, 1001));
  for (const name of target.split("/")) {
    const member = listChildren(space, at).find((child) => child.browseName.name === name);
    if (!member) throw new Error(`${target}: no member ${name}`);
    at = member.key;
  }
  return formatNodeId(space.requireNode(at).nodeId);
}

function runner(): MappingRunner {
  const document = getValue(readMappingDocument(readFileSync(file, "utf8")));
  const plan = planMapping(document.mapping, {
    findConversion,
    findLayout: (role, direction) => {
      const layout = findLayout(document, role, direction);
      if (!layout) throw new Error(role);
      return ok(layout);
    },
  });
  return new MappingRunner(getValue(plan));
}

function frame(hex: string) {
  return { octets: parseHex(hex) ?? new Uint8Array(), isValid: true, time: 1_000 };
}

describe("the demo's mapping", () => {
  test("is the committed document", async () => {
    await expect(writeMappingDocument(makeBraiderMapping(nodeIdOf))).toMatchFileSnapshot(file);
  });

  /** Layouts and scales of the demo scenario; numbers worked out by hand. */
  test("makes node values of frames and registers", () => {
    const running = runner();
    running.offerFrame("creel sensor", "in", frame("08 98 FC 00"));
    running.offerFrame("carriage sensor", "in", frame("27 74 FB 00"));
    running.offerFrame("condition monitor", "in", frame("00 E7 02 82 61 27 94 00 00 00 00 05"));
    const offer = (address: number, type: "Float32" | "Int32", value: number): void => {
      const meter = type === "Int32";
      const channel = toChannelKey({
        kind: "register",
        role: meter ? "meter" : "controller",
        table: meter ? "input-register" : "holding-register",
        address,
        type,
        order: "ABCD",
      });
      running.offerSample(channel, { value, status: 0, time: 900 });
    };
    offer(12, "Float32", 100.5);
    offer(0, "Int32", 3840);
    const values = Object.fromEntries(running.list().map((u) => [u.target, u.sample.value]));
    expect(values).toMatchObject({
      "Process/CreelDistance": 220,
      "Process/CreelFill": 50,
      "Process/CarriagePosition": 101,
      "Process/CarriageDeviation": 0.5,
      "Environment/GearboxVibration": 2.31,
      "Environment/GearboxTemperature": 64.2,
      "Environment/Humidity": 48.5,
      "Environment/AmbientPressure": 1013.2,
      "Energy/ActivePower": 3.84,
    });
  });
});
