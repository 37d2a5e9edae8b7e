/** Values of every type in the form, DataTypes in their tables, NodeIds in theirs: by role and label, in both themes. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import type { Browser, Locator, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startApp, type AppServer } from "../support/app-server";
import {
  findAccessibilityProblems,
  openBrowser,
  openWindow,
  signInAs,
  type Theme,
  type Visitor,
} from "../support/browser";
import { findModelId } from "../support/demo-session";
import { projectRoot } from "../support/source-files";

const file = readFileSync(join(projectRoot, "tests/fixtures/nodesets/values-of-all-types.NodeSet2.xml"), "utf8");

let app: AppServer;
let browser: Browser;
let tomas: Visitor;
let page: Page;
let model: string;

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp("demo"), openBrowser()]);
  tomas = await openWindow(browser, app.url);
  page = tomas.page;
  await signInAs(tomas, "Tomas Lindqvist");
  await page.goto("/models/import");
  await page
    .getByLabel("Drop a NodeSet2 file here")
    .setInputFiles({ name: "values.xml", mimeType: "text/xml", buffer: Buffer.from(file) });
  await page.getByLabel("Name").fill("Values");
  await page.getByRole("button", { name: "Import as model" }).click();
  await page.waitForURL(/\/models\/[^/]+\/sheet$/);
  model = await findModelId(page, "Values");
});

afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

const keyOf = (id: number): string => encodeURIComponent(`nsu=http://example.test/UA/Values/;i=${id}`);

/** Opens the value of a Variable through the register and its drawer. */
async function openValue(name: string): Promise<Locator> {
  const filter = page.getByRole("searchbox", { name: /Filter/ }).or(page.getByRole("textbox", { name: /Filter/ }));
  await filter.first().fill(name);
  await page
    .getByRole("row", { name: new RegExp(`\\b${name}\\b`) })
    .getByRole("gridcell")
    .nth(1)
    .click();
  await page.getByRole("heading", { name, exact: true }).waitFor();
  await page.getByRole("button", { name: "Open the value" }).click();
  const form = page.getByRole("group", { name: `Value of ${name}` });
  await form.waitFor();
  return form;
}

async function commit(form: Locator): Promise<void> {
  await form.getByRole("button", { name: "Commit" }).click();
  await form.waitFor({ state: "detached" });
}

/** The file as it is exported now. */
async function exportFile(): Promise<string> {
  await page
    .getByText(/^Saved/)
    .first()
    .waitFor();
  return (await page.request.get(`/models/${model}/nodeset`)).text();
}

/** The text between the tags of one node's Value. */
function findValue(xml: string, name: string): string | undefined {
  const node = xml.slice(xml.indexOf(`BrowseName="1:${name}"`));
  return /<Value>([\s\S]*)<\/Value>/.exec(node.slice(0, node.indexOf("</UAVariable>")))?.[1];
}

const fill = (text: string) => async (form: Locator, name: string) =>
  form.getByRole("textbox", { name, exact: true }).fill(text);

/** How somebody fills in each built-in type, and what OPC 10000-6 §5.3.1 writes for it. */
const builtIn: readonly [name: string, fill: (form: Locator, name: string) => Promise<void>, written: RegExp][] = [
  ["ABoolean", (form, name) => form.getByRole("checkbox", { name }).check(), /<Boolean[^>]*>true<\/Boolean>/],
  ["ASByte", fill("−128"), /<SByte[^>]*>-128<\/SByte>/],
  ["AByte", fill("255"), /<Byte[^>]*>255<\/Byte>/],
  ["AInt16", fill("-5"), /<Int16[^>]*>-5<\/Int16>/],
  ["AUInt16", fill("7"), /<UInt16[^>]*>7<\/UInt16>/],
  ["AInt32", fill("70000"), /<Int32[^>]*>70000<\/Int32>/],
  ["AUInt32", fill("4294967295"), /<UInt32[^>]*>4294967295<\/UInt32>/],
  ["AInt64", fill("-9223372036854775808"), /<Int64[^>]*>-9223372036854775808<\/Int64>/],
  ["AUInt64", fill("18446744073709551615"), /<UInt64[^>]*>18446744073709551615<\/UInt64>/],
  ["AFloat", fill("2,5"), /<Float[^>]*>2.5<\/Float>/],
  ["ADouble", fill("−INF"), /<Double[^>]*>-INF<\/Double>/],
  ["AString", fill("a < b"), /<String[^>]*>a &lt; b<\/String>/],
  ["ADateTime", fill("2026-12-01 09:30"), /<DateTime[^>]*>2026-12-01T09:30:00Z<\/DateTime>/],
  ["AGuid", fill("72962B91-FA75-4AE6-8D28-B404DC7DAF63"), /<String>72962b91-fa75-4ae6-8d28-b404dc7daf63<\/String>/],
  ["AByteString", fill("66 6f 6F"), /<ByteString[^>]*>Zm9v<\/ByteString>/],
  ["AXmlElement", fill('<Note xmlns="urn:n">x</Note>'), /<XmlElement[^>]*><Note xmlns="urn:n">x<\/Note><\/XmlElement>/],
  [
    "ANodeId",
    async (form, name) => {
      await form.getByRole("combobox", { name }).fill("BaseObjectType");
      await page
        .getByRole("option", { name: /^BaseObjectType/ })
        .first()
        .click();
    },
    /<Identifier>i=58<\/Identifier>/,
  ],
  [
    "AExpandedNodeId",
    async (form, name) => {
      await form.getByRole("combobox", { name, exact: true }).fill("i=85");
      await page.keyboard.press("Tab");
      await form.getByRole("textbox", { name: `Server index of ${name}` }).fill("2");
    },
    /<Identifier>svr=2;i=85<\/Identifier>/,
  ],
  [
    "AStatusCode",
    async (form, name) => {
      await form.getByRole("combobox", { name }).fill("BadNotConn");
      await page.getByRole("option", { name: /^BadNotConnected/ }).click();
    },
    /<Code>2156527616<\/Code>/,
  ],
  [
    "AQualifiedName",
    async (form, name) => {
      await fill("Speed")(form, name);
      await form.getByRole("combobox", { name: `Namespace of ${name}` }).selectOption({ label: "Values" });
    },
    /<NamespaceIndex>1<\/NamespaceIndex>\s*<Name>Speed<\/Name>/,
  ],
  [
    "ALocalizedText",
    async (form, name) => {
      await fill("Halt")(form, name);
      await form.getByRole("textbox", { name: `Locale of ${name}` }).fill("de");
    },
    /<Locale>de<\/Locale>\s*<Text>Halt<\/Text>/,
  ],
  [
    "ADataValue",
    async (form) => {
      await form.getByRole("checkbox", { name: "Value is present" }).check();
      await form.getByRole("combobox", { name: "Type of Value" }).selectOption("String");
      await form.getByRole("textbox", { name: "Value", exact: true }).fill("late");
      await form.getByRole("checkbox", { name: "StatusCode is present" }).check();
      await form.getByRole("combobox", { name: "StatusCode" }).fill("0x40920000");
      await page.keyboard.press("Tab");
    },
    /<Value>\s*<String>late<\/String>\s*<\/Value>\s*<StatusCode>\s*<Code>1083310080<\/Code>/,
  ],
  [
    "AVariant",
    async (form) => {
      await form.getByRole("combobox", { name: "Type of AVariant" }).selectOption("Int32");
      await form.getByRole("combobox", { name: "Shape of AVariant" }).selectOption("array");
      await form.getByRole("textbox", { name: "AVariant 0" }).fill("3");
    },
    /<ListOfInt32[^>]*>\s*<Int32>3<\/Int32>\s*<\/ListOfInt32>/,
  ],
  [
    "ADiagnosticInfo",
    async (form) => {
      await form.getByRole("checkbox", { name: "AdditionalInfo is present" }).check();
      await form.getByRole("textbox", { name: "AdditionalInfo" }).fill("loose wire");
    },
    /<AdditionalInfo>loose wire<\/AdditionalInfo>/,
  ],
  [
    "AStructure",
    async (form, name) => {
      await form.getByRole("combobox", { name: `Concrete type of ${name}` }).fill("PointType");
      await page
        .getByRole("option", { name: /^PointType/ })
        .first()
        .click();
      await form.getByRole("textbox", { name: "X" }).fill("4");
    },
    /<PointType[^>]*>\s*<EncodingMask>0<\/EncodingMask>\s*<X>4<\/X>\s*<Y>0<\/Y>/,
  ],
];

describe("the value form", () => {
  it("takes a value of every built-in type and writes it as the standard does", async () => {
    await page.goto(`/models/${model}/register`);
    for (const [name, write] of builtIn) {
      const form = await openValue(name);
      await write(form, name);
      await commit(form);
    }
    const xml = await exportFile();
    for (const [name, , written] of builtIn) expect(findValue(xml, name), name).toMatch(written);
    expect(builtIn.length).toBe(25);
  });

  it("leaves a value that is committed unchanged as the file wrote it, to the last byte", async () => {
    for (const name of ["APoint", "Limits", "Matrix", "Series", "Health", "Unknown"])
      await commit(await openValue(name));
    const xml = await exportFile();
    for (const name of ["APoint", "Limits", "Matrix", "Series", "Health", "Unknown"])
      expect(findValue(xml, name), name).toBe(findValue(file, name));
  });

  it("says in plain words at the field why a text is no value, and commits nothing", async () => {
    const form = await openValue("AByte");
    await form.getByRole("textbox", { name: "AByte" }).fill("300");
    await form.getByRole("alert").getByText("Byte takes whole numbers from 0 to 255.").waitFor();
    await page.keyboard.press("Control+Enter");
    await form.getByText(/one field is not finished/).waitFor();
    await form.getByRole("textbox", { name: "AByte" }).fill("30");
    await page.keyboard.press("Control+Enter");
    await form.waitFor({ state: "detached" });
    expect(findValue(await exportFile(), "AByte")).toMatch(/>30</);
  });

  it("edits lists by keyboard: Enter adds, Alt moves, a pasted column fills", async () => {
    const form = await openValue("Series");
    const row = (index: number): Locator => form.getByRole("textbox", { name: `Series ${index}` });
    await row(2).focus();
    await page.keyboard.press("Enter");
    await page.keyboard.type("9");
    await page.keyboard.press("Alt+ArrowUp");
    await expect.poll(() => row(2).inputValue()).toBe("9");
    await row(0).evaluate((input) => {
      const clipboardData = new DataTransfer();
      clipboardData.setData("text/plain", "10\n20");
      input.dispatchEvent(new ClipboardEvent("paste", { clipboardData, bubbles: true, cancelable: true }));
    });
    await commit(form);
    expect(findValue(await exportFile(), "Series")?.match(/>[\d.]+</g)).toEqual([">10<", ">20<", ">9<", ">3.0<"]);
  });

  it("edits a matrix as a grid and keeps what stays inside another size", async () => {
    const form = await openValue("Matrix");
    await form.getByRole("spinbutton", { name: "Dimension 1 of Matrix" }).fill("3");
    await form.getByRole("textbox", { name: "Matrix 2, 0" }).fill("7");
    await commit(form);
    const xml = findValue(await exportFile(), "Matrix") ?? "";
    expect(xml.match(/<UInt32>\d<\/UInt32>/g)).toEqual(["<UInt32>3</UInt32>", "<UInt32>3</UInt32>"]);
    expect(xml.match(/<Double>\d<\/Double>/g)?.join("")).toBe(
      [1, 2, 3, 4, 5, 6, 7, 0, 0].map((n) => `<Double>${n}</Double>`).join(""),
    );
  });

  it("edits nested structures, subtypes, unions, option sets and enumerations", async () => {
    const drawing = await openValue("ADrawing");
    await drawing.getByRole("textbox", { name: "Title", exact: true }).fill("Plan");
    await drawing.getByRole("combobox", { name: "Concrete type of Main" }).fill("Circle");
    await page
      .getByRole("option", { name: /^CircleType/ })
      .first()
      .click();
    const main = drawing.getByRole("group", { name: "Main" });
    await main.getByRole("textbox", { name: "Radius" }).fill("12.5");
    await main.getByRole("checkbox", { name: "Label is present" }).check();
    await drawing.getByRole("checkbox", { name: /^Worn/ }).check();
    await commit(drawing);

    const reading = await openValue("AReading");
    await reading.getByRole("combobox", { name: "Field of the union" }).selectOption("Text");
    await reading.getByRole("textbox", { name: "Text", exact: true }).fill("full");
    await commit(reading);

    const locks = await openValue("Locks");
    await locks.getByRole("checkbox", { name: "Lid is set" }).check();
    await locks.getByRole("checkbox", { name: "Lid is valid" }).check();
    await commit(locks);

    const colour = await openValue("AColour");
    await colour.getByRole("combobox", { name: "AColour" }).selectOption({ label: "Blue (2)" });
    await commit(colour);

    const xml = await exportFile();
    expect(findValue(xml, "ADrawing")).toMatch(/<CircleType[\s\S]*<Radius>12.5<\/Radius>[\s\S]*<Flags>16<\/Flags>/);
    expect(findValue(xml, "AReading")).toMatch(/<SwitchField>2<\/SwitchField>\s*<Text>/);
    // Bit 9 is bit 1 of the second byte: 00 02 (OPC 10000-3 §8.40).
    expect(findValue(xml, "Locks")).toMatch(/<Value>AAI=<\/Value>\s*<ValidBits>AAI=<\/ValidBits>/);
    expect(findValue(xml, "AColour")).toMatch(/<Int32[^>]*>2<\/Int32>/);
  });
});

describe("the drawer", () => {
  it("opens the form from the register's cell where a text would not do", async () => {
    await page.goto(`/models/${model}/register?node=${keyOf(6026)}`);
    const cell = page.getByRole("row", { name: /\bAPoint\b/ }).getByRole("gridcell", { name: /X: 1.5/ });
    await cell.click();
    await page.keyboard.press("Enter");
    const form = page.getByRole("group", { name: "Value of APoint" });
    await form.getByRole("textbox", { name: "X" }).waitFor();
    await page.keyboard.press("Escape");
    await form.waitFor({ state: "detached" });
  });

  it("edits attributes, permissions and extensions, and tells who did it", async () => {
    await page.goto(`/models/${model}/register?node=${keyOf(6026)}`);
    const attributes = page.getByRole("region", { name: "Attributes" });
    await attributes.getByRole("textbox", { name: "Symbol" }).fill("A_Point");
    await page.keyboard.press("Enter");
    await attributes.getByRole("combobox", { name: "Release" }).selectOption("Draft");
    const permissions = page.getByRole("region", { name: "Permissions" });
    await permissions.getByRole("button", { name: "Role", exact: true }).click();
    await permissions.getByRole("combobox", { name: "Role 1" }).selectOption({ label: "Operator" });
    const extensions = page.getByRole("region", { name: "Extensions" });
    await extensions.getByRole("button", { name: "Add extension" }).click();
    await extensions.getByRole("textbox", { name: "New extension" }).fill("<Note>");
    await extensions
      .getByRole("alert")
      .getByText(/Not well-formed/)
      .waitFor();
    await extensions.getByRole("textbox", { name: "New extension" }).fill('<Note xmlns="urn:n">1</Note>');
    await page.keyboard.press("Tab");
    await extensions.getByRole("textbox", { name: "Extension 1" }).waitFor();
    const xml = await exportFile();
    const written = xml.slice(xml.indexOf('BrowseName="1:APoint"') - 200, xml.indexOf('BrowseName="1:Points"'));
    expect(written).toMatch(/SymbolicName="A_Point"/);
    expect(written).toMatch(/ReleaseStatus="Draft"/);
    // Role Operator is i=15680 (OPC 10000-18 §4.3); Browse and Read are bits 0 and 5 (OPC 10000-3 Table 38).
    expect(written).toMatch(/<RolePermission Permissions="33">i=15680<\/RolePermission>/);
    expect(written).toMatch(/<Extension>\s*<Note xmlns="urn:n">1<\/Note>\s*<\/Extension>/);
    const history = page.getByRole("region", { name: "History" });
    await history.getByText(/release status: nothing → Draft/).waitFor();
    await history.getByText("Tomas Lindqvist").first().waitFor();
    await history.getByText("came with the model").waitFor();
  });
});

describe("the DataType tables", () => {
  it("make a structure from lines, with encodings that have NodeIds of their own", async () => {
    await page.goto(`/models/${model}/types?type=${keyOf(3001)}`);
    await page.getByRole("button", { name: "New DataType" }).click();
    const form = page.getByRole("region", { name: "New DataType" });
    await form.getByLabel("Name").fill("RecipeType");
    await form.getByLabel("Fields, one a line").fill("Speed Double\nSteps UInt16[]\nNote? String");
    await form.getByRole("button", { name: "Add structure" }).click();
    const table = page.getByRole("table", { name: "Fields" });
    await table.getByRole("textbox", { name: "Name of field 3" }).waitFor();
    await table.getByRole("checkbox", { name: "Note is optional", checked: true }).waitFor();
    const xml = await exportFile();
    for (const encoding of ["Default Binary", "Default XML", "Default JSON"])
      expect(xml.split(`BrowseName="${encoding}"`).length - 1, encoding).toBe(
        file.split(`BrowseName="${encoding}"`).length,
      );
  });

  it("tell which values no longer fit before a field goes, and rewrite them when asked", async () => {
    await page.goto(`/models/${model}/types?type=${keyOf(3001)}`);
    await page.getByRole("button", { name: "Remove field Y" }).click();
    const consequences = page.getByRole("group", { name: "Consequences" });
    await consequences.getByText("Bench / APoint").waitFor();
    await consequences.getByRole("button", { name: "Do not" }).click();
    await page.getByRole("textbox", { name: "Name of field 3" }).waitFor();
    await page.getByRole("button", { name: "Remove field Y" }).click();
    await consequences.getByRole("button", { name: "Apply and rewrite the values" }).click();
    await page.getByRole("textbox", { name: "Name of field 3" }).waitFor({ state: "detached" });
    expect(findValue(await exportFile(), "APoint")).toMatch(/<X>1.5<\/X>\s*<Label>north<\/Label>/);
    await page.keyboard.press("Control+z");
    await page.getByRole("textbox", { name: "Name of field 3" }).waitFor();
    expect(findValue(await exportFile(), "APoint")).toBe(findValue(file, "APoint"));
  });
});

describe("renumbering", () => {
  it("swaps two NodeIds, shows every use, and records old and new", async () => {
    await page.goto(`/models/${model}/renumber`);
    await page.getByRole("checkbox", { name: "Tick Bench / ABoolean" }).check();
    await page.getByRole("checkbox", { name: "Tick Bench / ASByte" }).check();
    await page.getByRole("button", { name: "Swap the two ticked" }).click();
    await page.getByRole("button", { name: "Uses of PointType", exact: true }).click();
    await page
      .getByText(/names it and is rewritten/)
      .first()
      .waitFor({ state: "detached" });
    await page.getByRole("textbox", { name: "NodeId to be of PointType", exact: true }).fill("i=3002");
    await page
      .getByText(/is taken|has this NodeId|already/)
      .first()
      .waitFor();
    await page.getByRole("textbox", { name: "NodeId to be of PointType", exact: true }).fill("i=3999");
    await page.getByRole("button", { name: "Renumber", exact: true }).click();
    await page.getByText("3 nodes have another NodeId.").waitFor();
    const xml = await exportFile();
    expect(xml).toMatch(/NodeId="ns=1;i=6002" BrowseName="1:ABoolean"/);
    expect(xml).toMatch(/NodeId="ns=1;i=6001" BrowseName="1:ASByte"/);
    expect(xml).toMatch(/BrowseName="1:APoint"[^>]* DataType="ns=1;i=3999"/);
    await page.reload();
    await page
      .getByRole("table", { name: /Renumbered nodes/ })
      .getByRole("cell", { name: "i=3999" })
      .waitFor();
  });
});

describe("axe", () => {
  for (const theme of ["light", "dark"] satisfies Theme[]) {
    it(`finds nothing on these screens in the ${theme} theme`, async () => {
      const visitor = await openWindow(browser, app.url, { theme });
      await signInAs(visitor, "Tomas Lindqvist");
      const found: string[] = [];
      const look = async (path: string, ready: (p: Page) => Locator, before?: (p: Page) => Promise<void>) => {
        await visitor.page.goto(path);
        await before?.(visitor.page);
        await ready(visitor.page).waitFor();
        found.push(...(await findAccessibilityProblems(visitor.page)).map((line) => `${path} ${line}`));
      };
      const register = `/models/${model}/register?node=`;
      await look(
        register + keyOf(6029),
        (p) => p.getByRole("group", { name: /^Value of/ }),
        (p) => p.getByRole("button", { name: "Open the value" }).click(),
      );
      await look(register + keyOf(3006), (p) => p.getByRole("table", { name: "Fields" }));
      await look(
        `/models/${model}/renumber`,
        (p) => p.getByRole("table", { name: "NodeIds now and to be" }),
        (p) => p.getByRole("searchbox", { name: /Nodes by name/ }).fill("AInt"),
      );
      await visitor.context.close();
      expect(found).toEqual([]);
      expect(visitor.complaints).toEqual([]);
    });
  }

  it("and nothing complained in the console", () => {
    expect(tomas.complaints).toEqual([]);
  });
});
