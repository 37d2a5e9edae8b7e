/**
 * The test server as a stranger sees it: every question goes through a bare node-opcua client, never through our own
 * client code. The expected NodeIds are taken from the NodeSet file as text, status codes and ids from OPC 10000-6 Annex A.
 */
import { readFileSync, writeFileSync } from "node:fs";
import { createConnection } from "node:net";
import { fork } from "node:child_process";
import { join } from "node:path";
import {
  AttributeIds,
  type ClientSession,
  DataType,
  MessageSecurityMode,
  OPCUACertificateManager,
  OPCUAClient,
  SecurityPolicy,
  UserTokenType,
  type UserIdentityInfo,
} from "node-opcua";
import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from "vitest";
import { Supervisor } from "~/opcua/supervisor.server";
import { buildTestServer, type TestServerBundle } from "../support/test-server-bundle";
import { makeSeed, makeStartMessage, makeTestFolder, removeTestFolders, startWinch, waitFor, winchFile, WINCH_URI } from "../support/winch-server";

// Each test starts real processes; a busy machine takes its time over them.
vi.setConfig({ testTimeout: 180_000, hookTimeout: 180_000 });

const UNCERTAIN_SIMULATED_VALUE = 0x42090000;
const GOOD = 0;

let bundle: TestServerBundle;
let supervisor: Supervisor;
const clientPki = makeTestFolder("stranger");

beforeAll(async () => {
  bundle = await buildTestServer("test-server");
});

afterEach(async () => {
  await supervisor.stopAll();
});

function newSupervisor(options: Partial<ConstructorParameters<typeof Supervisor>[0]> = {}): Supervisor {
  return (supervisor = new Supervisor({ entry: bundle.entry, ...options }));
}

type Security = { mode: MessageSecurityMode; policy: SecurityPolicy };
const SECURED: Security = { mode: MessageSecurityMode.SignAndEncrypt, policy: SecurityPolicy.Basic256Sha256 };
const OPEN: Security = { mode: MessageSecurityMode.None, policy: SecurityPolicy.None };

async function withStranger<T>(
  endpointUrl: string | null,
  security: Security,
  work: (session: ClientSession, client: OPCUAClient) => Promise<T>,
  user?: UserIdentityInfo,
): Promise<T> {
  const client = OPCUAClient.create({
    applicationName: "Stranger",
    clientCertificateManager: new OPCUACertificateManager({ rootFolder: clientPki, automaticallyAcceptUnknownCertificate: true, disableFileWatchers: true }),
    securityMode: security.mode,
    securityPolicy: security.policy,
    endpointMustExist: false,
    connectionStrategy: { maxRetry: 0 },
  });
  await client.connect(endpointUrl ?? "");
  try {
    const session = await client.createSession(user);
    try {
      return await work(session, client);
    } finally {
      await session.close();
    }
  } finally {
    await client.disconnect();
  }
}

/** NodeIds of the file with the index that this server gave to the file's namespace. */
function listNodeIdsOfFile(index: number): string[] {
  const xml = readFileSync(winchFile, "utf8");
  return [...xml.matchAll(/<UA\w+ NodeId="ns=1;([^"]+)"/g)].map((match) => `ns=${index};${match[1]}`);
}

const isListening = (port: number): Promise<boolean> =>
  new Promise((resolve) => {
    const socket = createConnection({ host: "127.0.0.1", port });
    socket.once("connect", () => resolve(true)).once("error", () => resolve(false));
    socket.once("connect", () => socket.destroy());
  });

const toPort = (endpointUrl: string | null): number => Number(new URL((endpointUrl ?? "").replace("opc.tcp:", "http:")).port);

describe("a running test server", () => {
  it("answers a stranger with every node of the file, moving values and an honest status", async () => {
    const state = await startWinch(newSupervisor(), makeSeed("whole"));
    expect(state.problems).toEqual([]);
    expect(state.state).toBe("running");
    expect(state.endpointUrl).toMatch(/^opc\.tcp:\/\/127\.0\.0\.1:\d+$/);

    await withStranger(state.endpointUrl, SECURED, async (session) => {
      const namespaces = await session.readNamespaceArray();
      const index = namespaces.indexOf(WINCH_URI);
      const ids = listNodeIdsOfFile(index);
      expect(ids.length).toBeGreaterThan(25);
      const classes = await session.read(ids.map((nodeId) => ({ nodeId, attributeId: AttributeIds.NodeClass })));
      expect(ids.filter((_, i) => classes[i]?.statusCode.value !== GOOD)).toEqual([]);

      const read = async (id: string) => session.read({ nodeId: `ns=${index};${id}`, attributeId: AttributeIds.Value });
      const load = await read("i=6100");
      expect(load.statusCode.value).toBe(UNCERTAIN_SIMULATED_VALUE);
      expect(load.value.value).toBeGreaterThanOrEqual(-20);
      expect(load.value.value).toBeLessThanOrEqual(120);
      expect([0, 1, 4]).toContain((await read("i=6110")).value.value);
      expect([0, 11, 31]).toContain((await read("i=6120")).value.value);
      expect(typeof (await read("i=6140")).value.value).toBe("boolean");
      expect((await read("i=6160")).value.value).toHaveLength(3);
      expect((await read("i=6170")).value.value).toMatchObject({ layers: 0, diameter: 0 });
      // Fixed values of the model: a data Variable is simulated all the same, a Property describes and is Good.
      expect(await read("i=6150")).toMatchObject({ value: { value: 17 }, statusCode: { value: UNCERTAIN_SIMULATED_VALUE } });
      expect(await read("i=6191")).toMatchObject({ value: { value: "Merrow Ropeworks" }, statusCode: { value: GOOD } });
      expect((await read("i=6190")).value.value).toBe("simulation");
      expect((await read("i=6101")).statusCode.value).toBe(GOOD);

      const counter = (await read("i=6130")).value.value as number;
      await waitFor(async () => ((await read("i=6130")).value.value !== counter ? true : undefined), 5_000);
      expect((await read("i=6100")).value.value).not.toBe(load.value.value);
    });
  });

  it("says in its name, its address and a node that it is a simulation", async () => {
    const state = await startWinch(newSupervisor(), makeSeed("notice"));
    await withStranger(state.endpointUrl, SECURED, async (session, client) => {
      const [endpoint] = await client.getEndpoints();
      expect(endpoint?.server.applicationName.text).toMatch(/simulation/i);
      expect(endpoint?.server.applicationUri).toMatch(/simulation/);
      const objects = await session.browse("i=85");
      const notice = objects.references?.find((r) => /simulation/i.test(r.browseName.name ?? ""));
      expect(notice?.displayName.text).toBe("Simulation, not for control");
      const value = await session.read({ nodeId: notice?.nodeId ?? "", attributeId: AttributeIds.Value });
      expect(value.value.value).toMatch(/not for control/);
    });
  });

  it("offers no unprotected endpoint unless it was asked for", async () => {
    const secured = await startWinch(newSupervisor(), makeSeed("secured"));
    const offered = await withStranger(secured.endpointUrl, SECURED, (_session, client) => client.getEndpoints());
    expect(new Set(offered.map((e) => `${e.securityPolicyUri?.split("#")[1]} ${MessageSecurityMode[e.securityMode]}`))).toEqual(
      new Set(["Basic256Sha256", "Aes128_Sha256_RsaOaep", "Aes256_Sha256_RsaPss"].flatMap((policy) => [`${policy} Sign`, `${policy} SignAndEncrypt`])),
    );
    for (const policy of [SecurityPolicy.Aes128_Sha256_RsaOaep, SecurityPolicy.Aes256_Sha256_RsaPss]) {
      await expect(withStranger(secured.endpointUrl, { mode: MessageSecurityMode.SignAndEncrypt, policy }, async () => "in")).resolves.toBe("in");
    }
    expect(new Set(offered.flatMap((e) => (e.userIdentityTokens ?? []).map((t) => UserTokenType[t.tokenType])))).toContain("UserName");
    await expect(withStranger(secured.endpointUrl, OPEN, async () => "in")).rejects.toThrow();

    const open = await startWinch(supervisor, makeSeed("open", ["none"]));
    await expect(withStranger(open.endpointUrl, OPEN, async () => "in")).resolves.toBe("in");
  });

  it("lets in the user that its page shows and nobody with another password", async () => {
    const state = await startWinch(newSupervisor(), makeSeed("users"));
    const user = { type: UserTokenType.UserName, userName: "tester", password: "hawser" } as const;
    await expect(withStranger(state.endpointUrl, SECURED, async () => "in", user)).resolves.toBe("in");
    await expect(withStranger(state.endpointUrl, SECURED, async () => "in", { ...user, password: "guess" })).rejects.toThrow(/Bad/);
  });

  it("serves simulated values as Good when that was chosen", async () => {
    const state = await startWinch(newSupervisor(), makeSeed("good"), { simulatedQuality: "good" });
    await withStranger(state.endpointUrl, SECURED, async (session) => {
      const index = (await session.readNamespaceArray()).indexOf(WINCH_URI);
      const load = await session.read({ nodeId: `ns=${index};i=6100`, attributeId: AttributeIds.Value });
      expect(load.statusCode.value).toBe(GOOD);
    });
  });

  it("keeps what a client writes, marked as forced by hand (OPC 10000-8 Table 59)", async () => {
    const state = await startWinch(newSupervisor(), makeSeed("forced"));
    await withStranger(state.endpointUrl, SECURED, async (session) => {
      const index = (await session.readNamespaceArray()).indexOf(WINCH_URI);
      const refused = await session.write({
        nodeId: `ns=${index};i=6100`,
        attributeId: AttributeIds.Value,
        value: { value: { dataType: "Float", value: 7 } },
      });
      expect(refused.name).toBe("BadNotWritable");
      const rope = `ns=${index};s=Rope;Length=1`;
      const written = await session.write({ nodeId: rope, attributeId: AttributeIds.Value, value: { value: { dataType: "Double", value: 7.25 } } });
      expect(written.name).toBe("Good");
      expect((await session.read({ nodeId: rope, attributeId: AttributeIds.Value })).value.value).toBe(7.25);
    });
  });

  it("answers Methods with typed results and says in its log that they were called", async () => {
    const state = await startWinch(newSupervisor(), makeSeed("methods"));
    await withStranger(state.endpointUrl, SECURED, async (session) => {
      const index = (await session.readNamespaceArray()).indexOf(WINCH_URI);
      const objectId = `ns=${index};i=5001`;
      const selected = await session.call({ objectId, methodId: `ns=${index};i=7002`, inputArguments: [{ dataType: DataType.UInt16, value: 12 }] });
      expect(selected.statusCode.value).toBe(GOOD);
      expect(selected.outputArguments?.map(({ dataType, value }) => [dataType, value])).toEqual([
        [DataType.Boolean, true],
        [DataType.UInt16, 12],
        [DataType.String, "simulation"],
      ]);
      const wrong = await session.call({ objectId, methodId: `ns=${index};i=7002`, inputArguments: [] });
      expect(wrong.statusCode.name).toBe("BadArgumentsMissing");
      expect((await session.call({ objectId, methodId: `ns=${index};i=7001`, inputArguments: [] })).statusCode.value).toBe(GOOD);
    });
    expect(supervisor.getLog("methods").map((line) => line.text)).toContain("Method SelectRecipe was called with 12.");
  });

  it("reports who is connected", async () => {
    const state = await startWinch(newSupervisor(), makeSeed("sessions"));
    await withStranger(state.endpointUrl, SECURED, async () => {
      const sessions = await waitFor(() => {
        const open = supervisor.get("sessions")?.sessions ?? [];
        return open.length > 0 ? open : undefined;
      });
      expect(sessions).toMatchObject([{ user: "anonymous", security: "Basic256Sha256, SignAndEncrypt" }]);
    });
    await waitFor(() => (supervisor.get("sessions")?.sessions.length === 0 ? true : undefined));
  });
});

describe("the end of a test server", () => {
  it("frees the port when it is stopped", async () => {
    const state = await startWinch(newSupervisor(), makeSeed("stop"));
    const port = toPort(state.endpointUrl);
    expect(await isListening(port)).toBe(true);
    await supervisor.stop("stop");
    expect(await isListening(port)).toBe(false);
    expect(supervisor.get("stop")).toBeUndefined();
  });

  it("is a failed state with its last lines when the process dies, and others go on", async () => {
    await startWinch(newSupervisor({ restartDelays: [] }), makeSeed("dies"));
    const other = await startWinch(supervisor, makeSeed("lives"));
    process.kill(supervisor.getPid("dies") ?? 0, "SIGKILL");
    const failed = await waitFor(() => {
      const state = supervisor.get("dies");
      return state?.state === "failed" ? state : undefined;
    });
    expect(failed.problems[0]).toMatchObject({ code: "test-server.exited", data: { reason: "signal SIGKILL" } });
    expect(failed.problems[0]?.data?.lastLines).toMatch(/Listening on/);
    expect(failed.endpointUrl).toBeNull();
    expect(await isListening(toPort(other.endpointUrl))).toBe(true);
  });

  it("is started again at the same address after a crash, says why, and gives up in the end", async () => {
    const first = await startWinch(newSupervisor({ restartDelays: [200] }), makeSeed("again"));
    process.kill(supervisor.getPid("again") ?? 0, "SIGKILL");
    await waitFor(() => (supervisor.get("again")?.state === "starting" ? true : undefined));
    const again = await waitFor(() => {
      const state = supervisor.get("again");
      return state?.state === "running" ? state : undefined;
    }, 60_000);
    expect(again.endpointUrl).toBe(first.endpointUrl);
    expect(again.problems[0]).toMatchObject({ code: "test-server.restarted", data: { reason: "signal SIGKILL", crashes: 1 } });
    process.kill(supervisor.getPid("again") ?? 0, "SIGKILL");
    await waitFor(() => (supervisor.get("again")?.state === "failed" ? true : undefined));
  });

  it("tells its memory and load", async () => {
    await startWinch(newSupervisor(), makeSeed("load"));
    const load = await waitFor(() => supervisor.get("load")?.load ?? undefined, 20_000);
    expect(load.memory).toBeGreaterThan(20);
    expect(load.processor).toBeGreaterThanOrEqual(0);
  });

  it("says why when the model's file cannot be loaded", async () => {
    const broken = join(makeTestFolder("broken"), "broken.xml");
    writeFileSync(broken, readFileSync(winchFile, "utf8").replace('ModelUri="http://opcfoundation.org/UA/"', 'ModelUri="http://merrow.example/UA/Missing/"'));
    const message = makeStartMessage(makeSeed("broken"));
    const state = await startWinch(newSupervisor(), makeSeed("broken"), { nodeSetFiles: [...message.nodeSetFiles.slice(0, -1), broken] });
    expect(state.state).toBe("failed");
    expect(state.problems[0]?.code).toBe("test-server.start");
    expect(state.problems[0]?.data?.detail).toMatch(/merrow\.example\/UA\/Missing/);
  });

  it("comes by itself when the start takes too long", async () => {
    const state = await startWinch(newSupervisor({ startTimeout: 300 }), makeSeed("slow"));
    expect(state.problems[0]?.code).toBe("test-server.start-timeout");
    await supervisor.stop("slow");
    expect(supervisor.getPid("slow")).toBeUndefined();
  });

  it("leaves no process behind when it is stopped while it starts", async () => {
    newSupervisor().announce(makeSeed("early"));
    supervisor.launch(makeStartMessage(makeSeed("early")), { sampleInstances: [], landingNode: null, servedSeq: 0 });
    const pid = supervisor.getPid("early") ?? 0;
    await supervisor.stop("early");
    expect(() => process.kill(pid, 0)).toThrow();
  });

  it("comes with the end of its parent, however that ends", async () => {
    const parent = fork(join(import.meta.dirname, "../support/test-server-parent.mjs"), [bundle.supervisor, bundle.entry, JSON.stringify(makeSeed("orphan")), JSON.stringify(makeStartMessage(makeSeed("orphan")))], {
      execArgv: [],
      stdio: ["ignore", "inherit", "inherit", "ipc"],
    });
    const pid = await new Promise<number>((resolve) => parent.once("message", (message) => resolve(message as number)));
    process.kill(pid, 0);
    parent.kill("SIGKILL");
    await waitFor(() => {
      try {
        process.kill(pid, 0);
        return undefined;
      } catch {
        return true;
      }
    });
    newSupervisor();
  });

  it("refuses one more than the machine has room for", async () => {
    newSupervisor({ maxRunning: 1 }).announce(makeSeed("first"));
    expect(supervisor.checkRoom()).toMatchObject({ code: "test-server.limit", data: { limit: 1 } });
  });
});

afterAll(async () => {
  await supervisor.stopAll();
  bundle.remove();
  removeTestFolders();
});
