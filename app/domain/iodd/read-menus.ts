/** Menus: they alone say in which unit and scaling a parameter is shown. */
import { findChild, listChildren, type XmlElement } from "../core/xml-tree";
import type { DisplayInfo, IoddMenu, IoddVariable } from "./device-description";
import type { IoddContext } from "./iodd-context";

/** How each variable is shown, by variable id. */
export type ShownVariables = ReadonlyMap<string, IoddVariable["shownAs"]>;

export function readMenus(
  context: IoddContext,
  userInterface: XmlElement | undefined,
): { menus: IoddMenu[]; shown: ShownVariables } {
  const collection = findChild(userInterface, "MenuCollection");
  const shown = new Map<string, IoddVariable["shownAs"][number][]>();
  const menus = (collection ? listChildren(collection, "Menu") : []).map((menu): IoddMenu => {
    const id = context.requireAttribute(menu, "id");
    const name = context.findTexts(menu, "Name");
    const entries: IoddMenu["entries"][number][] = [];
    for (const entry of menu.children) {
      const variableId = entry.attributes.variableId;
      if (entry.name === "MenuRef") entries.push({ kind: "menu", menuId: context.requireAttribute(entry, "menuId") });
      if ((entry.name !== "VariableRef" && entry.name !== "RecordItemRef") || variableId === undefined) continue;
      const subindex = entry.name === "RecordItemRef" ? context.requireInteger(entry, "subindex", 1, 255) : undefined;
      entries.push({ kind: "variable", variableId, ...(subindex === undefined ? {} : { subindex }) });
      const info = readDisplayInfo(entry);
      if (Object.keys(info).length === 0) continue;
      const list = shown.get(variableId) ?? [];
      list.push({ ...info, subindex: subindex ?? 0, menuId: id });
      shown.set(variableId, list);
    }
    return { id, ...(name ? { name } : {}), entries };
  });
  return { menus, shown };
}

/** displayFormat, gradient, offset and unitCode of an element that has them. */
export function readDisplayInfo(element: XmlElement): DisplayInfo {
  const { displayFormat, gradient, offset, unitCode } = element.attributes;
  return {
    ...(displayFormat === undefined ? {} : { displayFormat }),
    ...finite("gradient", gradient),
    ...finite("offset", offset),
    ...finite("unitCode", unitCode),
  };
}

function finite<K extends string>(key: K, text: string | undefined): Partial<Record<K, number>> {
  if (text === undefined || text.trim() === "" || !Number.isFinite(Number(text))) return {};
  return { [key]: Number(text) } as Record<K, number>;
}
