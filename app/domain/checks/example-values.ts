/** Values of examples, written as NodeSet2 files hold them (OPC 10000-6 §5.3.1). */
import type { XmlText } from "../address-space/node";

const TYPES = 'xmlns="http://opcfoundation.org/UA/2008/02/Types.xsd"';

export const UNECE_URI = "http://www.opcfoundation.org/UA/units/un/cefact";

/** A scalar: `scalar("Double", 1.5)`. */
export function scalar(builtIn: string, content: string | number | boolean): XmlText {
  return { xml: `<${builtIn} ${TYPES}>${content}</${builtIn}>` };
}

/** A one-dimensional array of scalars. */
export function list(builtIn: string, ...items: readonly (string | number)[]): XmlText {
  const inner = items.map((item) => `<${builtIn}>${item}</${builtIn}>`).join("");
  return { xml: `<ListOf${builtIn} ${TYPES}>${inner}</ListOf${builtIn}>` };
}

export function matrix(
  builtIn: string,
  dimensions: readonly number[],
  ...items: readonly (string | number)[]
): XmlText {
  const sizes = dimensions.map((d) => `<Int32>${d}</Int32>`).join("");
  const inner = items.map((item) => `<${builtIn}>${item}</${builtIn}>`).join("");
  return { xml: `<Matrix ${TYPES}><Dimensions>${sizes}</Dimensions><Elements>${inner}</Elements></Matrix>` };
}

function extensionObjectXml(typeId: string, body: string, attributes = ""): string {
  return `<ExtensionObject${attributes}><TypeId><Identifier>${typeId}</Identifier></TypeId><Body>${body}</Body></ExtensionObject>`;
}

export function extensionObject(typeId: string, body: string): XmlText {
  return { xml: extensionObjectXml(typeId, body, ` ${TYPES}`) };
}

export function extensionObjects(typeId: string, ...bodies: readonly string[]): XmlText {
  return {
    xml: `<ListOfExtensionObject ${TYPES}>${bodies.map((b) => extensionObjectXml(typeId, b)).join("")}</ListOfExtensionObject>`,
  };
}

/** A Range, OPC 10000-8 §5.6.2. */
export function range(low: number | string, high: number | string): XmlText {
  return extensionObject("i=885", `<Range><Low>${low}</Low><High>${high}</High></Range>`);
}

export type UnitParts = { uri?: string; unitId: number; symbol?: string; name?: string };

/** An EUInformation, OPC 10000-8 §5.6.3. */
export function unit({ uri = UNECE_URI, unitId, symbol = "", name = "" }: UnitParts): XmlText {
  return extensionObject(
    "i=888",
    `<EUInformation><NamespaceUri>${uri}</NamespaceUri><UnitId>${unitId}</UnitId>` +
      `<DisplayName><Text>${symbol}</Text></DisplayName><Description><Text>${name}</Text></Description></EUInformation>`,
  );
}

/** °C by its UN/CEFACT code CEL. */
export const CELSIUS = unit({ unitId: 4408652, symbol: "°C", name: "degree Celsius" });

export type ArgumentParts = { name: string; dataType: string; valueRank?: number; dimensions?: readonly number[] };

/** The value of InputArguments or OutputArguments. */
export function argumentList(...parts: readonly ArgumentParts[]): XmlText {
  return extensionObjects(
    "i=297",
    ...parts.map(
      ({ name, dataType, valueRank = -1, dimensions = [] }) =>
        `<Argument><Name>${name}</Name><DataType><Identifier>${dataType}</Identifier></DataType><ValueRank>${valueRank}</ValueRank>` +
        `<ArrayDimensions>${dimensions.map((d) => `<UInt32>${d}</UInt32>`).join("")}</ArrayDimensions></Argument>`,
    ),
  );
}

/** The value of EnumValues. */
export function enumValues(...pairs: readonly (readonly [value: number, text: string])[]): XmlText {
  return extensionObjects(
    "i=7616",
    ...pairs.map(
      ([value, text]) =>
        `<EnumValueType><Value>${value}</Value><DisplayName><Text>${text}</Text></DisplayName><Description/></EnumValueType>`,
    ),
  );
}

export function localizedText(text: string): XmlText {
  return { xml: `<LocalizedText ${TYPES}><Text>${text}</Text></LocalizedText>` };
}

export function localizedTexts(...texts: readonly string[]): XmlText {
  const inner = texts.map((t) => `<LocalizedText><Text>${t}</Text></LocalizedText>`).join("");
  return { xml: `<ListOfLocalizedText ${TYPES}>${inner}</ListOfLocalizedText>` };
}

/** A NodeId by its text, with `nsu=` outside namespace 0. */
export function nodeId(text: string): XmlText {
  return { xml: `<NodeId ${TYPES}><Identifier>${text}</Identifier></NodeId>` };
}
