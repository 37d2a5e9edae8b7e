export const sourceProblemTexts: Readonly<Record<string, string>> = {
  "source.unreachable": "{url} does not answer: {message}.",
  "source.no-json": "{url} answers with something else than JSON: {message}.",
  "source.answer-too-large": "The answer of {url} is larger than {limit} bytes.",
  "source.answer-unexpected": "The answer of {url} has another form than expected: {message}.",
  "source.refused": "{url} refuses with HTTP {httpStatus}, code {code}: {message}.",
  "source.not-live": "{name} cannot be read live: its address says no place that is asked over the network.",
  "source.item": "This kind of source cannot be asked for {kind}.",
  "source.no-node": "{url} has no {path}.",
  "source.name-taken": "There is a source with the name {name} already.",
  "source.address": "This kind of source needs its {field}.",
  "source.no-ports": "{name} has no IO-Link ports.",
  "source.no-such-port": "{name} has {portCount} ports; there is no port {port}.",
  "gateway.name-taken": "There is a gateway with the name {name} already.",
  "device.missing": "The device description is not in the library any more.",
  "source.modbus-exception": "Unit {unitId} answers exception {code} for {table} {address}.",
};

/** Problems by which a source as a whole is out of reach; all others are its answers. */
export const sourceOutage: ReadonlySet<string> = new Set(["source.unreachable"]);
