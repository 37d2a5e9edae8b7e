import { describe, expect, it } from "vitest";
import { parseFrameText } from "~/domain/mapping/parse-frame-text";
import type { Direction } from "~/domain/iodd/device-description";

function read(text: string, direction: Direction = "in") {
  const result = parseFrameText(text, direction);
  return result.ok
    ? { octets: [...result.value.octets], isValid: result.value.isValid, form: result.value.form }
    : result.problems.map((p) => p.code);
}

describe("pasted bytes", () => {
  it.each(["04 D2 17 01", "04d21701", "0x04,0xD2,0x17,0x01", "04:D2:17:01", "04-d2-17-01"])(
    "reads %s as hexadecimal",
    (text) => {
      expect(read(text)).toEqual({ octets: [4, 210, 23, 1], isValid: true, form: "hex" });
    },
  );

  it.each(["4, 210, 23, 1", "[4, 210, 23, 1]", "4;210;23;1"])("reads %s as decimal octets", (text) => {
    expect(read(text)).toEqual({ octets: [4, 210, 23, 1], isValid: true, form: "decimal" });
  });

  // Body of GET /devices/{alias}/processdata/value of the JSON integration for IO-Link 1.0 (order no. 10.222); keys of both editions.
  it("takes the side of a master's answer that was asked for, with its validity", () => {
    const answer =
      '{"getData":{"ioLink":{"valid":false,"value":[12,22,216]}},"setData":{"iolink":{"valid":true,"value":[5]}}}';
    expect(read(answer, "in")).toEqual({ octets: [12, 22, 216], isValid: false, form: "answer" });
    expect(read(answer, "out")).toEqual({ octets: [5], isValid: true, form: "answer" });
    expect(read('{"ioLink":{"valid":true,"value":[12,22,216]},"iqValue":true}')).toMatchObject({
      octets: [12, 22, 216],
    });
  });

  it("says what is wrong and where", () => {
    expect(read("")).toEqual(["frame.empty"]);
    expect(read("04 D")).toEqual(["frame.text"]);
    expect(read("[1, 256]")).toEqual(["frame.octet"]);
    expect(read("[1,")).toEqual(["frame.text"]);
    expect(read('{"getData":{"cqValue":false}}')).toEqual(["frame.answer"]);
    expect(read('{"getData":{"ioLink":{"valid":true,"value":[1]}}}', "out")).toEqual(["frame.answer-direction"]);
    expect(read('{"getData":{"ioLink":{"valid":true,"value":{"Distance":{"value":55}}}}}')).toEqual(["frame.answer"]);
    expect(read("00".repeat(233))).toEqual(["frame.too-long"]);
  });
});
