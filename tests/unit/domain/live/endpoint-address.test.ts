/** The form of addresses: OPC 10000-6 §7.2 (opc.tcp); the port 4840: IANA's registry of services. Blocks: RFC 4632. */
import { describe, expect, it } from "vitest";
import { isAllowed, parseAllowanceHost, parseEndpointUrl } from "~/domain/live/endpoint-address";

describe("parseEndpointUrl", () => {
  it.each([
    ["opc.tcp://gateway-1", "gateway-1", 4840],
    ["opc.tcp://GATEWAY-1:4841/UA/Server", "gateway-1", 4841],
    ["opc.tcp://10.20.0.7:62541", "10.20.0.7", 62541],
    ["opc.tcp://[fd00::1]:4840", "fd00::1", 4840],
  ])("reads %s", (text, host, port) => {
    expect(parseEndpointUrl(text)).toMatchObject({ ok: true, value: { host, port } });
  });

  it.each(["http://gateway-1", "opc.tcp://", "opc.tcp://a:0", "opc.tcp://a:70000", "opc.tcp://user@host:4840", "opc.tcp://a b", "gateway-1:4840"])("refuses %s", (text) => {
    expect(parseEndpointUrl(text)).toMatchObject({ ok: false, problems: [{ code: "endpoint.address" }] });
  });
});

describe("isAllowed", () => {
  const at = (host: string, portFrom = 1, portTo = 65_535) => [{ host, portFrom, portTo }];
  it("knows names, ends of names, addresses and blocks", () => {
    expect(isAllowed({ host: "gateway-1", port: 4840 }, at("gateway-1"))).toBe(true);
    expect(isAllowed({ host: "gateway-11", port: 4840 }, at("gateway-1"))).toBe(false);
    expect(isAllowed({ host: "a.plant.example", port: 4840 }, at("*.plant.example"))).toBe(true);
    expect(isAllowed({ host: "plant.example", port: 4840 }, at("*.plant.example"))).toBe(false);
    expect(isAllowed({ host: "evilplant.example", port: 4840 }, at("*.plant.example"))).toBe(false);
    expect(isAllowed({ host: "10.20.255.1", port: 4840 }, at("10.20.0.0/16"))).toBe(true);
    expect(isAllowed({ host: "10.21.0.1", port: 4840 }, at("10.20.0.0/16"))).toBe(false);
    expect(isAllowed({ host: "10.20.1", port: 4840 }, at("10.20.0.0/16"))).toBe(false);
    expect(isAllowed({ host: "anything", port: 4840 }, [])).toBe(false);
  });
  it("keeps to the ports", () => {
    expect(isAllowed({ host: "g", port: 4841 }, at("g", 4840, 4840))).toBe(false);
    expect(isAllowed({ host: "g", port: 4840 }, at("g", 4840, 4850))).toBe(true);
  });
});

describe("parseAllowanceHost", () => {
  it.each(["gateway-1", "*.plant.example", "10.20.0.0/16", "127.0.0.1", "fd00::1"])("takes %s", (host) => {
    expect(parseAllowanceHost(host).ok).toBe(true);
  });
  it.each(["*", "a*", "10.0.0.0/33", "a b", "http://x", ""])("refuses %s", (host) => {
    expect(parseAllowanceHost(host)).toMatchObject({ ok: false, problems: [{ code: "endpoint.allowance-host" }] });
  });
});
