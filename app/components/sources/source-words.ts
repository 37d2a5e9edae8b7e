/** Sources in words. Pure. */
import type { PortPlan, SourceAddress, SourceKind } from "~/domain/mapping/source-settings";

export const kindWords: Readonly<Record<SourceKind, string>> = {
  "rest-master": "IO-Link master, REST (JSON integration)",
  "opc-ua-master": "IO-Link master, OPC UA (OPC 30120)",
  "controller-master": "IO-Link master behind a controller",
  "modbus-unit": "Modbus TCP",
  "opc-ua-server": "OPC UA server",
  "rest-service": "REST service",
  "tag-server": "Controller tags",
};

export const shortKindWords: Readonly<Record<SourceKind, string>> = {
  "rest-master": "REST, JSON",
  "opc-ua-master": "OPC UA server",
  "controller-master": "behind a controller",
  "modbus-unit": "Modbus TCP",
  "opc-ua-server": "OPC UA server",
  "rest-service": "REST service",
  "tag-server": "tags",
};

export const modeWords: Readonly<Record<PortPlan["mode"], string>> = {
  IOL_AUTOSTART: "IO-Link, autostart",
  IOL_MANUAL: "IO-Link, checks the device",
  DI: "digital input",
  DO: "digital output",
  DEACTIVATED: "deactivated",
};

/** `http://192.0.2.10`, `192.0.2.20:502, unit 11`. */
export function formatAddress(address: SourceAddress): string {
  const { url, host, port, unitId } = address;
  const parts = [
    url ?? "",
    host === undefined ? "" : `${host}${port === undefined ? "" : `:${port}`}`,
    unitId === undefined ? "" : `unit ${unitId}`,
  ];
  return parts.filter((part) => part !== "").join(", ");
}

export type AddressField = "url" | "host" | "port" | "unitId" | "masterNumber" | "portCount" | "masterName";

/** What an address of each kind is made of, in the order of the form. */
export const addressFields: Readonly<Record<SourceKind, readonly AddressField[]>> = {
  "rest-master": ["url", "masterNumber", "portCount"],
  "opc-ua-master": ["url", "masterName", "portCount"],
  "controller-master": ["portCount"],
  "modbus-unit": ["host", "port", "unitId"],
  "opc-ua-server": ["url"],
  "rest-service": ["url"],
  "tag-server": [],
};

export const addressWords: Readonly<Record<AddressField, readonly [label: string, hint: string]>> = {
  url: ["Address", "http://…, or opc.tcp://… for an OPC UA server"],
  host: ["Host", "name or IP address"],
  port: ["TCP port", "usually 502"],
  unitId: ["Unit id", "empty when machines say it"],
  masterNumber: ["Master number", "1 when the gateway has one master"],
  portCount: ["Ports", "how many the master has"],
  masterName: ["Name below IOLinkMasterSet", "BrowseName of the master"],
};

export const numberFields: ReadonlySet<AddressField> = new Set(["port", "unitId", "masterNumber", "portCount"]);
