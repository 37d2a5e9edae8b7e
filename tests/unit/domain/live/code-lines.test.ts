import { expect, it } from "vitest";
import { makeCodeLines } from "~/domain/live/code-lines";

it("asks the server for the namespace's index", () => {
  expect(makeCodeLines("nsu=http://merrow.example/UA/Winch/;i=6100").map((line) => line.text)).toEqual([
    '(await session.read({ nodeId: "ns=" + (await session.readNamespaceArray()).indexOf("http://merrow.example/UA/Winch/") + ";i=6100", attributeId: 13 })).value.value',
    `await client.get_node(f"ns={await client.get_namespace_index('http://merrow.example/UA/Winch/')};i=6100").read_value()`,
  ]);
});

it("needs none for the base namespace, and no line for what is no NodeId", () => {
  expect(makeCodeLines("i=2258").map((line) => line.text)).toEqual(['(await session.read({ nodeId: "i=2258", attributeId: 13 })).value.value', 'await client.get_node("i=2258").read_value()']);
  expect(makeCodeLines("winch")).toEqual([]);
});
