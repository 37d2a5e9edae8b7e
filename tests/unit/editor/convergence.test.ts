import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { numericNodeId, toNodeKey } from "~/domain/address-space/node-id";
import { snapshotOwn } from "../../support/expect-operation";
import { choice, makeOperation } from "../../support/random-operations";
import { settle, SimulatedServer, SimulatedWindow } from "../../support/simulated-server";
import { makeNode, makeSpace, TEST_NAMESPACE } from "../../support/small-standard";

const start = makeSpace([1, 2, 3].map((id) => makeNode(id, "Object")));
const rename = (id: number, text: string) =>
  [
    {
      kind: "setAttribute",
      key: toNodeKey(numericNodeId(TEST_NAMESPACE, id)),
      attribute: "displayName",
      value: [{ text }],
    },
  ] as const;

const step = fc.record({
  window: fc.nat(1),
  what: fc.constantFrom(
    "edit",
    "edit",
    "edit",
    "undo",
    "redo",
    "hear",
    "offline",
    "online",
    "lose",
    "settle",
    "timers",
    "reload",
  ),
  choice,
});

describe("two windows and a server", () => {
  it("end equal, with nothing lost silently, through conflicts, lost answers, outages and reloads", async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(step, { minLength: 5, maxLength: 60 }), async (steps) => {
        const server = new SimulatedServer(start);
        const windows = [new SimulatedWindow(server, "a"), new SimulatedWindow(server, "b")];
        const dispatched: string[] = [];
        for (const [index, { window: number, what, choice: made }] of steps.entries()) {
          const window = windows[number] as SimulatedWindow;
          const { store } = window;
          if (what === "edit") {
            const operation = makeOperation(store.getState().space, made, number * 1000);
            const label = `edit ${number}.${index}`;
            if (store.dispatch(label, [operation]).ok) dispatched.push(label);
          } else if (what === "undo") store.undo();
          else if (what === "redo") store.redo();
          else if (what === "hear") window.hear(1 + (made.a % 3));
          else if (what === "offline") window.isOnline = false;
          else if (what === "online") window.isOnline = true;
          else if (what === "lose") window.answersToLose = 1;
          else if (what === "timers") window.runTimers();
          else if (what === "reload") window.reload();
          if (what === "settle" || made.flag) await settle();
        }
        for (const window of windows) {
          window.isOnline = true;
          window.answersToLose = 0;
        }
        for (let round = 0; round < 12; round++) {
          for (const window of windows) {
            window.runTimers();
            await settle();
            window.hear(100);
            await window.store.catchUp();
            await settle();
          }
        }
        const truth = snapshotOwn(server.space.own);
        for (const { store } of windows) {
          expect(store.getState()).toMatchObject({ seq: server.list.length, pendingCount: 0, sync: "saved" });
          expect(snapshotOwn(store.getState().space.own)).toEqual(truth);
        }
        const stored = server.list.map((t) => t.label).filter((label) => label.startsWith("edit "));
        const refused = windows.flatMap((w) => w.refused).filter((label) => label.startsWith("edit "));
        expect([...stored, ...refused].sort()).toEqual([...dispatched].sort());
        expect(new Set(stored).size).toBe(stored.length);
      }),
      { numRuns: 250 },
    );
  });

  it("refuses after a reload what somebody else changed while the window was away", async () => {
    const server = new SimulatedServer(start);
    const one = new SimulatedWindow(server, "a");
    const two = new SimulatedWindow(server, "b");
    one.isOnline = false;
    one.store.dispatch("mine", rename(1, "mine"));
    two.store.dispatch("theirs", rename(1, "theirs"));
    await settle();
    one.isOnline = true;
    one.reload();
    await settle();
    expect(one.refused).toEqual(["mine"]);
    expect(server.list.map((t) => t.label)).toEqual(["theirs"]);
  });

  it("asks the server a few times only when messages of the stream are late", async () => {
    const server = new SimulatedServer(start);
    const one = new SimulatedWindow(server, "a");
    const two = new SimulatedWindow(server, "b");
    for (let i = 0; i < 20; i++) {
      two.store.dispatch("theirs", rename(2, `t${i}`));
      one.store.dispatch("mine", rename(1, `m${i}`));
      await settle();
    }
    expect(one.store.getState().pendingCount + two.store.getState().pendingCount).toBe(0);
    expect(server.posts).toBeLessThan(4 * 20);
  });
});
