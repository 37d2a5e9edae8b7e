/**
 * ProcessDataCollection. Name, type and position come from here; unit and scaling only from the user interface's
 * ProcessDataRefCollection, which names the image by id.
 */
import { problem } from "../core/result";
import { findChild, listChildren, type XmlElement } from "../core/xml-tree";
import { checkLayout } from "./check-layout";
import type { DisplayInfo, IoddVariable, ProcessData, ProcessDataImage } from "./device-description";
import type { IoddContext } from "./iodd-context";
import { findIoddUnit } from "./iodd-units";
import { readDisplayInfo } from "./read-menus";
import type { DatatypeReader } from "./read-datatypes";

export function readProcessData(
  context: IoddContext,
  datatypes: DatatypeReader,
  functions: XmlElement | undefined,
  variables: readonly IoddVariable[],
): ProcessData[] {
  const infos = readInfos(context, findChild(functions, "UserInterface", "ProcessDataRefCollection"));
  const collection = findChild(functions, "ProcessDataCollection");
  return (collection ? listChildren(collection, "ProcessData") : []).map((element): ProcessData => {
    const id = context.requireAttribute(element, "id");
    const input = findChild(element, "ProcessDataIn");
    const output = findChild(element, "ProcessDataOut");
    const condition = readCondition(context, id, findChild(element, "Condition"), variables);
    return {
      id,
      ...(condition ? { condition } : {}),
      ...(input ? { in: readImage(context, datatypes, input, infos) } : {}),
      ...(output ? { out: readImage(context, datatypes, output, infos) } : {}),
    };
  });
}

function readCondition(
  context: IoddContext,
  id: string,
  element: XmlElement | undefined,
  variables: readonly IoddVariable[],
): ProcessData["condition"] {
  if (!element) return undefined;
  const variableId = context.requireAttribute(element, "variableId");
  if (!variables.some((v) => v.id === variableId)) {
    context.report(problem("iodd.condition-without-variable", { id, variableId }), element);
  }
  const { subindex } = element.attributes;
  return {
    variableId,
    ...(subindex === undefined ? {} : { subindex: context.requireInteger(element, "subindex", 1, 255) }),
    value: context.requireAttribute(element, "value"),
  };
}

function readImage(
  context: IoddContext,
  datatypes: DatatypeReader,
  element: XmlElement,
  infos: ReadonlyMap<string, Readonly<Record<number, DisplayInfo>>>,
): ProcessDataImage {
  const id = context.requireAttribute(element, "id");
  const name = context.findTexts(element, "Name");
  const image: ProcessDataImage = {
    id,
    bitLength: context.requireInteger(element, "bitLength", 1, 65_535),
    type: datatypes.readOf(element),
    ...(name ? { name } : {}),
    info: infos.get(id) ?? {},
  };
  checkLayout(context, image, element);
  return image;
}

function readInfos(context: IoddContext, collection: XmlElement | undefined): Map<string, Record<number, DisplayInfo>> {
  const infos = new Map<string, Record<number, DisplayInfo>>();
  for (const reference of collection ? listChildren(collection, "ProcessDataRef") : []) {
    const id = context.requireAttribute(reference, "processDataId");
    const bySubindex = infos.get(id) ?? {};
    for (const child of reference.children) {
      const subindex =
        child.name === "ProcessDataRecordItemInfo"
          ? context.requireInteger(child, "subindex", 1, 255)
          : child.name === "ProcessDataInfo"
            ? 0
            : undefined;
      if (subindex === undefined) continue;
      const info = readDisplayInfo(child);
      if (info.unitCode !== undefined && !findIoddUnit(info.unitCode)) {
        context.report(problem.warning("iodd.unknown-unit", { code: info.unitCode }), child);
      }
      bySubindex[subindex] = info;
    }
    infos.set(id, bySubindex);
  }
  return infos;
}
