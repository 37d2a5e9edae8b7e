/** Methods answer with typed results, so that a client can be tried out before the machine is there. */
import { type AddressSpace, type Argument, DataType, type ISessionContext, NodeClass, StatusCodes, type UAMethod, Variant, VariantArrayType } from "node-opcua";
import type { BuiltInType } from "~/domain/simulation/motion";
import { toWireNodeId } from "../node-ids";
import { makePlainValue } from "./encode-value";

/**
 * Binds the Methods. An output that has the name and type of an input gives it back, a truth value says true, everything
 * else is a plain value of its type; nothing else happens, and the log says that it was called.
 */
export function answerMethods(space: AddressSpace, methods: readonly string[], log: (text: string) => void): void {
  const namespaces = space.getNamespaceArray().map((namespace) => namespace.namespaceUri);
  for (const nodeId of methods) {
    const id = toWireNodeId(nodeId, namespaces);
    const node = id.ok ? space.findNode(id.value) : null;
    if (node?.nodeClass === NodeClass.Method) answer(space, node as UAMethod, log);
  }
}

function answer(space: AddressSpace, method: UAMethod, log: (text: string) => void): void {
  const inputs = method.getInputArguments();
  const outputs = method.getOutputArguments();
  // The library tells the forms of a Method's function apart by the number of its parameters.
  method.bindMethod(async (given: Variant[], _context: ISessionContext) => {
    log(`Method ${method.browseName.name ?? ""} was called with ${given.length === 0 ? "no arguments" : given.map((one) => String(one.value)).join(", ")}.`);
    return {
      statusCode: StatusCodes.Good,
      outputArguments: outputs.map((output) => makeOutput(space, output, findEcho(inputs, given, output))),
    };
  });
}

function findEcho(inputs: readonly Argument[], given: readonly Variant[], output: Argument): Variant | undefined {
  const at = inputs.findIndex((input) => input.name === output.name && input.dataType.toString() === output.dataType.toString());
  return at < 0 ? undefined : given[at];
}

function makeOutput(space: AddressSpace, { dataType, valueRank }: Argument, echo: Variant | undefined): Variant {
  if (echo) return echo;
  const basic = space.findCorrespondingBasicDataType(dataType);
  if (valueRank >= 1) return new Variant({ dataType: basic, arrayType: VariantArrayType.Array, value: [] });
  const builtInType = (DataType[basic] ?? "Variant") as BuiltInType;
  const value = builtInType === "Boolean" ? true : makePlainValue(space, builtInType, space.findDataType(dataType), new Date());
  return value === undefined ? new Variant({}) : new Variant({ dataType: basic, arrayType: VariantArrayType.Scalar, value });
}
