/**
 * The process of a made-up IO-Link master with an OPC UA server: the types of OPC 30120, one master below IOLinkMasterSet,
 * and process data that its parent tells it. For development, demo and tests, on loopback only.
 */
import { join } from "node:path";
import {
  DataType,
  MessageSecurityMode,
  OPCUACertificateManager,
  OPCUAServer,
  SecurityPolicy,
  StatusCodes,
  Variant,
  VariantArrayType,
  type AddressSpace,
  type BaseNode,
  type ISessionContext,
  type UAMethod,
  type UAObject,
  type UAVariable,
} from "node-opcua";
import { toFakeMasterSchema, type FromFakeMaster, type ToFakeMaster } from "./messages";

type Start = Extract<ToFakeMaster, { kind: "start" }>;
type PortSpec = Start["ports"][number];

const IOLINK = "http://opcfoundation.org/UA/IOLink/";
/** Port states and error types of OPC 30120 and of the IODD standard definitions. */
const OPERATE = 4;
const NO_DEVICE = 0;
const INDEX_NOT_AVAILABLE = 0x8011;

const inputs = new Map<number, UAVariable>();
let server: OPCUAServer | undefined;

process.on("message", (raw) => {
  const message = toFakeMasterSchema.parse(raw);
  if (message.kind === "start") start(message).catch((error: unknown) => fail(error));
  else if (message.kind === "frames") for (const frame of message.frames) setInput(frame.port, frame.octets, frame.isValid);
  else void end();
});
process.on("disconnect", () => void end());
process.on("SIGTERM", () => void end());
process.on("SIGINT", () => undefined);

async function start(config: Start): Promise<void> {
  const certificates = new OPCUACertificateManager({ rootFolder: join(config.pkiFolder, "server"), automaticallyAcceptUnknownCertificate: true, disableFileWatchers: true });
  await certificates.initialize();
  server = new OPCUAServer({
    host: "127.0.0.1",
    hostname: "127.0.0.1",
    port: 0,
    nodesets: config.nodeSetFiles,
    serverInfo: { applicationUri: "urn:ferrule:fake-master", productUri: "urn:ferrule:fake-master", applicationName: { text: `${config.masterName} (fake)`, locale: "en" } },
    serverCertificateManager: certificates,
    userCertificateManager: certificates,
    securityModes: [MessageSecurityMode.None],
    securityPolicies: [SecurityPolicy.None],
    allowAnonymous: true,
    registerServerMethod: 1,
  });
  await server.initialize();
  const space = server.engine.addressSpace;
  if (!space) throw new Error("The server has no address space.");
  addMaster(space, config);
  await server.start();
  const port = server.endpoints[0]?.port ?? 0;
  send({ kind: "ready", endpointUrl: `opc.tcp://127.0.0.1:${port}` });
}

function addMaster(space: AddressSpace, { masterName, portCount, ports }: Start): void {
  const index = space.getNamespaceIndex(IOLINK);
  const masterType = space.findObjectType("IOLinkMasterType", index);
  const portType = space.findObjectType("IOLinkPortType", index);
  const set = space.rootFolder.objects.getFolderElementByName("IOLinkMasterSet", index);
  if (!masterType || !portType || !set) throw new Error("The types of OPC 30120 are not loaded.");
  const master = masterType.instantiate({ browseName: { name: masterName, namespaceIndex: 1 }, organizedBy: set });
  for (let number = 1; number <= portCount; number++) {
    const spec = ports.find((p) => p.port === number);
    const port = portType.instantiate({
      browseName: { name: `Port${number}`, namespaceIndex: index },
      componentOf: master,
      ...(spec ? { optionals: ["Device", "Device.SerialNumber"] } : {}),
    });
    setNumber(findVariable(port, ["ParameterSet", "Status"]), DataType.Byte, spec ? OPERATE : NO_DEVICE);
    if (spec) addDevice(port, spec);
  }
}

function addDevice(port: UAObject, spec: PortSpec): void {
  setNumber(findVariable(port, ["Device", "VendorID"]), DataType.UInt16, spec.vendorId);
  setNumber(findVariable(port, ["Device", "DeviceID"]), DataType.UInt32, spec.deviceId);
  findVariable(port, ["Device", "SerialNumber"])?.setValueFromSource({ dataType: DataType.String, value: spec.serialNumber });
  const input = findVariable(port, ["Device", "ParameterSet", "ProcessDataInput"]);
  const output = findVariable(port, ["Device", "ParameterSet", "ProcessDataOutput"]);
  if (input) inputs.set(spec.port, input);
  if (output) output.setValueFromSource(toBytes([]));
  setInput(spec.port, [], false);
  const method = findNode(port, ["Device", "MethodSet", "ReadISDU"]) as UAMethod | undefined;
  method?.bindMethod(async (inputArguments: Variant[], _context: ISessionContext) => {
    const [index, subindex] = inputArguments.map((argument) => Number(argument.value));
    const octets = subindex === 0 ? spec.parameters[String(index)] : undefined;
    const result = octets ?? [];
    return {
      statusCode: octets ? StatusCodes.Good : StatusCodes.BadNotFound,
      outputArguments: [
        toBytes(result),
        new Variant({ dataType: DataType.UInt16, value: octets ? 0 : INDEX_NOT_AVAILABLE }),
        new Variant({ dataType: DataType.Int32, value: octets ? 0 : 1 }),
      ],
    };
  });
}

function setInput(port: number, octets: readonly number[], isValid: boolean): void {
  inputs.get(port)?.setValueFromSource(toBytes(octets), isValid ? StatusCodes.Good : StatusCodes.Bad, new Date());
}

function toBytes(octets: readonly number[]): Variant {
  return new Variant({ dataType: DataType.Byte, arrayType: VariantArrayType.Array, value: Uint8Array.from(octets) });
}

function setNumber(variable: UAVariable | undefined, dataType: DataType, value: number): void {
  variable?.setValueFromSource({ dataType, value });
}

function findVariable(start: UAObject, steps: readonly string[]): UAVariable | undefined {
  return findNode(start, steps) as UAVariable | undefined;
}

/** By names alone: the steps stand in the namespaces of OPC 30120 and DI. */
function findNode(start: UAObject, steps: readonly string[]): unknown {
  let at: BaseNode | undefined = start;
  for (const step of steps) at = at?.findReferencesExAsObject("HierarchicalReferences").find((n) => n.browseName.name === step);
  return at;
}

function send(message: FromFakeMaster): void {
  if (process.connected) process.send?.(message);
}

async function fail(error: unknown): Promise<void> {
  send({ kind: "failed", detail: error instanceof Error ? error.message : String(error) });
  await end();
}

async function end(): Promise<void> {
  await Promise.race([server?.shutdown(50), new Promise((resolve) => setTimeout(resolve, 1_500))]).catch(() => undefined);
  process.exit(0);
}
