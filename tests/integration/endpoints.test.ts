/** Endpoints of the team against a server that node-opcua starts without us: who may add, reach, trust and act. */
import { createServer, type AddressInfo } from "node:net";
import { join } from "node:path";
import { MessageSecurityMode, OPCUACertificateManager, OPCUAServer, SecurityPolicy } from "node-opcua";
import { nodesets } from "node-opcua-nodesets";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { startTestApp, type TestApp } from "../support/test-app";
import { addOtherOrganization, addTestPerson, setUpFirst } from "../support/test-people";
import { makeTestFolder, removeTestFolders, winchFile, WINCH_URI } from "../support/winch-server";

vi.setConfig({ testTimeout: 120_000, hookTimeout: 120_000 });

let app: TestApp;
let administrator: string;
let reviewer: string;
let integrator: string;
let stranger: string;
let server: OPCUAServer;
let url: string;

beforeAll(async () => {
  const port = await findFreePort();
  url = `opc.tcp://127.0.0.1:${port}`;
  const certificates = new OPCUACertificateManager({ rootFolder: join(makeTestFolder("endpoint-server"), "own"), automaticallyAcceptUnknownCertificate: true, disableFileWatchers: true });
  server = new OPCUAServer({
    port,
    host: "127.0.0.1",
    hostname: "127.0.0.1",
    serverCertificateManager: certificates,
    userCertificateManager: certificates,
    nodeset_filename: [nodesets.standard, winchFile],
    securityModes: [MessageSecurityMode.SignAndEncrypt, MessageSecurityMode.Sign, MessageSecurityMode.None],
    securityPolicies: [SecurityPolicy.None, SecurityPolicy.Basic256Sha256, SecurityPolicy.Aes256_Sha256_RsaPss],
    allowAnonymous: true,
    userManager: { isValidUser: (name: string, password: string) => name === "watch" && password === "keeper" },
  });
  await server.start();
  app = await startTestApp();
  const first = await setUpFirst(app);
  administrator = first.cookie;
  reviewer = await addTestPerson(app, first.organizationId, "Rea", ["reviewer"]);
  integrator = await addTestPerson(app, first.organizationId, "Ida", ["integrator"]);
  stranger = (await addOtherOrganization(app)).cookie;
});

afterAll(async () => {
  await app.stop();
  await server.shutdown(0);
  removeTestFolders();
});

function findFreePort(): Promise<number> {
  return new Promise((resolve) => {
    const probe = createServer().listen(0, "127.0.0.1", () => {
      const { port } = probe.address() as AddressInfo;
      probe.close(() => resolve(port));
    });
  });
}

type Answer = { errors: string[]; done?: string; discovery?: { endpoints: { securityMode: string; securityPolicy: string; tokens: string[] }[]; certificate: { data: string; fingerprint: string; isSelfSigned: boolean } | null } };

async function post(fields: Record<string, string>, cookie = administrator): Promise<{ status: number; answer: Answer }> {
  const body = new URLSearchParams(fields).toString();
  const response = await app.call("POST", "/live/endpoints", { cookie, body, headers: { "content-type": "application/x-www-form-urlencoded" } });
  const text = await response.text();
  return { status: response.status, answer: text.startsWith("{") ? (JSON.parse(text) as Answer) : { errors: [text] } };
}

const list = async (cookie = administrator) => (await (await app.call("GET", "/live/endpoints", { cookie })).json()) as { endpoints: { id: string; name: string; isAllowed: boolean }[]; allowances: { id: string }[] };

const protectedEndpoint = (certificate: string) => ({
  intent: "save",
  name: "Winch gateway",
  url,
  securityMode: "sign-and-encrypt",
  securityPolicy: "Aes256_Sha256_RsaPss",
  tokenKind: "user-name",
  userName: "watch",
  secret: "keeper",
  serverCertificate: certificate,
});

describe("endpoints", () => {
  let certificate: string;

  it("reach nothing until an administrator allows the place", async () => {
    const { status, answer } = await post({ intent: "discover", url });
    expect({ status, error: answer.errors[0] }).toMatchObject({ status: 422, error: expect.stringContaining("may not connect to 127.0.0.1") });
    expect((await post({ intent: "allow", host: "127.0.0.1", portFrom: "1024", portTo: "65535" }, reviewer)).status).toBe(403);
    expect(await post({ intent: "allow", host: "127.0.0.1", portFrom: "1024", portTo: "65535" })).toMatchObject({ status: 200 });
  });

  it("say what the server offers, the strongest first, with its certificate", async () => {
    const { answer } = await post({ intent: "discover", url }, reviewer);
    expect(answer.errors).toEqual([]);
    expect(answer.discovery?.endpoints.map((e) => `${e.securityMode} ${e.securityPolicy}`)).toEqual(expect.arrayContaining(["none None", "sign Basic256Sha256", "sign-and-encrypt Aes256_Sha256_RsaPss"]));
    expect(answer.discovery?.endpoints.at(-1)).toMatchObject({ securityMode: "none" });
    certificate = answer.discovery?.certificate?.data ?? "";
    // The server keeps its own certificate as PEM or DER; its first bytes are enough to know it again.
    expect(certificate).toBe(server.getCertificate().toString("base64"));
  });

  it("are not saved without trust, nor without a secret, nor twice under one name", async () => {
    const { serverCertificate: _none, ...untrusted } = protectedEndpoint(certificate);
    expect((await post(untrusted)).answer.errors[0]).toContain("trust it first");
    const { secret: _secret, ...unsaid } = protectedEndpoint(certificate);
    expect((await post(unsaid)).answer.errors[0]).toContain("who the session is for");
    expect(await post(protectedEndpoint(certificate))).toMatchObject({ status: 200, answer: { errors: [] } });
    expect((await post(protectedEndpoint(certificate))).answer.errors[0]).toContain("already");
    const text = JSON.stringify(await list());
    expect(text).not.toContain("keeper");
    expect(text).not.toContain("secret");
  });

  it("are read with user name, Aes256_Sha256_RsaPss and the trusted certificate", async () => {
    const id = (await list()).endpoints[0]?.id ?? "";
    const answer = await app.call("GET", `/live/${id}/node?node=${encodeURIComponent(`nsu=${WINCH_URI};i=6100`)}`, { cookie: reviewer });
    expect(await answer.json()).toMatchObject({ browseName: "Load", dataType: { name: "Float" }, unit: { unitId: 4408652 } });
    expect((await app.call("GET", `/live/${id}/children?node=i%3D85`, { cookie: stranger })).status).toBe(404);
  });

  it("are written only by those who may, and only when named once more", async () => {
    const id = (await list()).endpoints[0]?.id ?? "";
    const node = `nsu=${WINCH_URI};i=6100`;
    const write = (cookie: string, confirm?: string) => app.call("POST", `/live/${id}/write`, { cookie, json: { node, value: 20, ...(confirm ? { confirm } : {}) } });
    expect((await write(reviewer, "Winch gateway")).status).toBe(403);
    const unconfirmed = await write(integrator);
    expect(unconfirmed.status).toBe(422);
    expect(JSON.stringify(await unconfirmed.json())).toContain("endpoint.unconfirmed");
    expect((await write(integrator, "Winch gateway")).status).not.toBe(403);
    const audit = await (await app.call("GET", "/team/audit.csv", { cookie: administrator })).text();
    expect(audit).toContain("live.write");
    expect(audit).toContain("endpoint.add");
  });

  it("are closed when their place is taken off the list", async () => {
    const before = await list();
    expect((await post({ intent: "forbid", id: before.allowances[0]?.id ?? "" })).status).toBe(200);
    const after = await list();
    expect(after.endpoints).toMatchObject([{ name: "Winch gateway", isAllowed: false }]);
    const answer = await app.call("GET", `/live/${after.endpoints[0]?.id}/children?node=i%3D85`, { cookie: reviewer });
    expect(answer.status).toBe(503);
    expect(JSON.stringify(await answer.json())).toContain("endpoint.not-allowed");
  });
});
