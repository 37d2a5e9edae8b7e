/** How a program reads a value of the interface, with general-purpose OPC UA client libraries of two languages. */
import { parseNodeId } from "../address-space/node-id";
import type { InterfaceDocument, InterfaceMember } from "./interface-document";

export type ReadingExample = { readonly language: string; readonly code: string };

/** The first value of a machine, else of a type (then as a pattern: the NodeIds of machines stand in their own model). */
export function makeReadingExamples(document: InterfaceDocument): ReadingExample[] {
  const member = findExample(document);
  const parsed = member && parseNodeId(member.nodeId, []);
  if (!member || !parsed?.ok) return [];
  const { namespaceUri, type, identifier } = parsed.value;
  const local = `${type}=${identifier}`;
  return [
    { language: `TypeScript, node-opcua: ${member.path}`, code: makeTypeScript(namespaceUri, local) },
    { language: `Python, asyncua: ${member.path}`, code: makePython(namespaceUri, local) },
  ];
}

function findExample({ owners }: InterfaceDocument): InterfaceMember | undefined {
  const machinesFirst = [...owners].sort((a, b) => (a.kind === b.kind ? 0 : a.kind === "machine" ? -1 : 1));
  const values = machinesFirst.flatMap((owner) => owner.members.filter((m) => m.nodeClass === "Variable"));
  return values.find((m) => m.unit !== null) ?? values[0];
}

function makeTypeScript(namespaceUri: string, local: string): string {
  return `import { AttributeIds, OPCUAClient } from "node-opcua";

const client = OPCUAClient.create({ endpointMustExist: false });
await client.withSessionAsync("opc.tcp://gateway.example:4840", async (session) => {
  const namespaces = await session.readNamespaceArray();
  const index = namespaces.indexOf(${JSON.stringify(namespaceUri)});
  const answer = await session.read({ nodeId: \`ns=\${index};${local}\`, attributeId: AttributeIds.Value });
  console.log(answer.value.value, answer.statusCode.name, answer.sourceTimestamp);
});`;
}

function makePython(namespaceUri: string, local: string): string {
  return `import asyncio
from asyncua import Client

async def main():
    async with Client("opc.tcp://gateway.example:4840") as client:
        index = await client.get_namespace_index(${JSON.stringify(namespaceUri)})
        node = client.get_node(f"ns={index};${local}")
        answer = await node.read_data_value()
        print(answer.Value.Value, answer.StatusCode.name, answer.SourceTimestamp)

asyncio.run(main())`;
}
