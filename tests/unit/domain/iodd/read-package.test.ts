import { zipSync, strToU8 } from "fflate";
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { readDevicePackage } from "~/domain/iodd/read-package";

const name = "Quillon-QS-U30-20261102-IODD1.1.xml";
const main = new Uint8Array(readFileSync(`nodesets/demo/iodd/${name}`));
const french = strToU8(
  '<ExternalTextDocument xmlns="http://www.io-link.com/IODD/2010/10"><Language xml:lang="fr"><Text id="T_DeviceName" value="Capteur de distance"/></Language></ExternalTextDocument>',
);

function codes(bytes: Uint8Array): string[] {
  return readDevicePackage(bytes, "device.zip").problems.map((p) => p.code);
}

describe("readDevicePackage", () => {
  test("reads a ZIP with a language file and a picture", () => {
    const zip = zipSync({
      [name]: main,
      [name.replace(".xml", "-fr.xml")]: french,
      "Quillon-logo.png": strToU8("png"),
    });
    const read = readDevicePackage(zip, "device.zip");
    expect(read.problems).toEqual([]);
    expect(read.ok && read.value.devices[0]?.device.deviceName).toMatchObject({
      en: "Ultrasonic distance sensor",
      fr: "Capteur de distance",
    });
    expect(read.ok && [...read.value.pictures.keys()]).toEqual(["Quillon-logo.png"]);
  });

  test("reads a single file", () => {
    expect(readDevicePackage(main, name)).toMatchObject({ ok: true, problems: [] });
  });

  test.each([
    ["a path that leaves the folder", zipSync({ "../evil.xml": main }), "package.path"],
    ["an absolute path", zipSync({ "/evil.xml": main }), "package.path"],
    ["no description", zipSync({ "a.png": strToU8("x"), "b.png": strToU8("y") }), "package.no-description"],
    [
      "too many entries",
      zipSync(Object.fromEntries(Array.from({ length: 501 }, (_, i) => [`${i}.png`, strToU8("x")]))),
      "package.entries",
    ],
    ["a bomb", zipSync({ "a.xml": new Uint8Array(101_000_000) }), "package.unpacked-size"],
    ["damage", zipSync({ [name]: main }).subarray(0, 900), "package.damaged"],
    ["a description that is another XML", zipSync({ "x-IODD1.1.xml": strToU8("<UANodeSet/>") }), "iodd.wrong-root"],
  ])("refuses %s", (_, bytes, code) => {
    expect(codes(bytes)).toEqual([code]);
  });
});
