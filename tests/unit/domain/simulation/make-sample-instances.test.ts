import { readFileSync } from "node:fs";
import { nodesets } from "node-opcua-nodesets";
import { describe, expect, it } from "vitest";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import { findParent, findTypeDefinition, getPath, listChildren } from "~/domain/address-space/browse";
import { StandardObject } from "~/domain/address-space/standard-ids";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { makeSampleInstances, SAMPLE_NAMESPACE } from "~/domain/simulation/make-sample-instances";
import { planSimulation } from "~/domain/simulation/plan-simulation";

const load = (file: string): Layer => {
  const { header, nodes } = getValue(readNodeSet(readFileSync(file, "utf8")));
  return buildLayer(header, nodes);
};
const demo = new URL("../../../../nodesets/demo/merrow-rope-braider.NodeSet2.xml", import.meta.url).pathname;
const required = [nodesets.standard, nodesets.di, nodesets.ia].map(load);
const space = AddressSpace.of(required, load(demo));

describe("sample instances of a model of types", () => {
  const sample = makeSampleInstances(space);
  const whole = AddressSpace.of(space.layers, sample?.layer ?? space.own);
  const instances = sample?.layer.nodes ? [...sample.layer.nodes.values()].sort((a, b) => a.order - b.order) : [];

  it("are one of each concrete ObjectType, below Objects, in a namespace of their own", () => {
    expect(sample?.names).toEqual(["RopeBraider"]);
    const [braider] = instances;
    expect(braider && findParent(whole, braider.key)).toBe(StandardObject.ObjectsFolder);
    expect(braider && whole.getNode(findTypeDefinition(whole, braider.key) ?? braider.key)?.browseName.name).toBe("RopeBraiderType");
    expect(new Set(instances.map((node) => node.nodeId.namespaceUri))).toEqual(new Set([SAMPLE_NAMESPACE]));
  });

  it("have the five groups of the scenario with mandatory and optional members", () => {
    const [braider] = instances;
    const groups = braider ? listChildren(whole, braider.key).map((node) => node.browseName.name) : [];
    expect(groups).toEqual(expect.arrayContaining(["Process", "Environment", "Configuration", "Energy", "Status"]));
    const paths = instances.map((node) => getPath(whole, node.key));
    expect(paths).toEqual(expect.arrayContaining(["RopeBraider/Process/PicksCounter", "RopeBraider/Energy/PowerFactor", "RopeBraider/Configuration/SensorTag"]));
  });

  it("can be set in motion", () => {
    const plan = planSimulation(whole);
    const motions = new Map(plan.map((entry) => [entry.path, entry.motion.kind]));
    expect(["sine", "ramp"]).toContain(motions.get("RopeBraider/Process/SpindleSpeed"));
    expect(motions.get("RopeBraider/Process/PicksCounter")).toBe("count");
    expect(motions.get("RopeBraider/Status/State")).toBe("steps");
    expect(motions.get("RopeBraider/Energy/ActiveEnergy")).toBe("rise");
    expect(motions.get("RopeBraider/Configuration/RecipeNumber")).toBe("static");
  });

  it("leave the model as it was", () => {
    expect(space.own.nodes.size).toBe(load(demo).nodes.size);
  });

  it("are not made for a model without a type to show", () => {
    expect(makeSampleInstances(AddressSpace.of(required.slice(0, 1), buildLayer({ namespaceUris: ["http://merrow.example/UA/Empty/"], models: [] }, [])))).toBeUndefined();
  });
});
