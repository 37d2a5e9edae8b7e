/** CommNetworkProfile: bit rate, cycle time, plugs and wires. */
import { findChild, listChildren, type XmlElement } from "../core/xml-tree";
import type { DeviceConnection, DeviceDescription } from "./device-description";
import type { IoddContext } from "./iodd-context";

const BITRATES = ["COM1", "COM2", "COM3"] as const;

export function readCommunication(
  context: IoddContext,
  profile: XmlElement | undefined,
): DeviceDescription["communication"] {
  if (!profile) return undefined;
  const layer = findChild(profile, "TransportLayers", "PhysicalLayer");
  const bitrate = BITRATES.find((rate) => rate === layer?.attributes.bitrate);
  const revision = profile.attributes.iolinkRevision;
  return {
    ...(revision === undefined ? {} : { ioLinkRevision: revision }),
    ...(bitrate ? { bitrate } : {}),
    ...(layer?.attributes.minCycleTime === undefined
      ? {}
      : { minCycleTime: context.requireInteger(layer, "minCycleTime", 0, 132_800) }),
    ...(layer?.attributes.sioSupported === undefined ? {} : { sioSupported: layer.attributes.sioSupported === "true" }),
    connections: layer ? listChildren(layer, "Connection").map((c) => readConnection(c)) : [],
  };
}

function readConnection(element: XmlElement): DeviceConnection {
  return {
    kind: (element.attributes["xsi:type"] ?? "").replace(/^.*:/, "").replace(/ConnectionT$/, ""),
    productIds: listChildren(element, "ProductRef").map((p) => p.attributes.productId ?? ""),
    wires: element.children
      .filter((c) => c.name.startsWith("Wire"))
      .map((c) => ({
        wire: c.attributes.color ? `${c.name} ${c.attributes.color}` : c.name,
        function: c.attributes.function ?? "",
      })),
  };
}
