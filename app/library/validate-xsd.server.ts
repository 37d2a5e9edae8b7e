/**
 * Validates NodeSet2 XML by the schema that the npm package ships. That schema is of 2020 and lacks one attribute of
 * later editions, DesignToolOnly of UAInstance (OPC 10000-6 §F.6), which is added in memory.
 */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { problem, type Problem } from "../domain/core/result";
import { getPackageFolder } from "./published.server";

const PARENT = '<xs:attribute name="ParentNodeId"';
const DESIGN_TOOL_ONLY = '<xs:attribute name="DesignToolOnly" type="xs:boolean" default="false" />';

/** Problems `xsd.invalid` with line and column; empty when the document is valid. */
export async function validateXsd(xml: string | Uint8Array): Promise<Problem[]> {
  const { XmlDocument, XmlParseError, XmlValidateError, XsdValidator } = await import("libxml2-wasm");
  const schema = XmlDocument.fromString(readSchema());
  const validator = XsdValidator.fromDoc(schema);
  try {
    const document = typeof xml === "string" ? XmlDocument.fromString(xml) : XmlDocument.fromBuffer(xml);
    try {
      validator.validate(document);
      return [];
    } finally {
      document.dispose();
    }
  } catch (error) {
    if (error instanceof XmlValidateError || error instanceof XmlParseError) return error.details.map(toProblem);
    throw error;
  } finally {
    validator.dispose();
    schema.dispose();
  }
}

function readSchema(): string {
  const text = readFileSync(join(getPackageFolder(), "UANodeSet.xsd"), "utf8");
  if (text.includes("DesignToolOnly") || !text.includes(PARENT)) return text;
  return text.replace(PARENT, `${DESIGN_TOOL_ONLY}${PARENT}`);
}

function toProblem(detail: { readonly message: string; readonly line: number; readonly col: number }): Problem {
  return problem(
    "xsd.invalid",
    { detail: detail.message.trim() },
    { line: Math.max(1, detail.line), column: Math.max(1, detail.col) },
  );
}
