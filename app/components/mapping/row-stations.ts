/** The stations of a row from the bits to the node, with the values of the bench where there are any. Pure. */
import type { FrameField } from "../frames/frame-fields";
import type { Target } from "~/domain/mapping/list-targets";
import type { RowContent, SourceReference } from "~/domain/mapping/mapping";
import { describePlace, tableWords, type Roles } from "./describe-source";
import { viewRoleFrame } from "./view-role-frame";
import { describeTransform, nameTransform } from "./describe-transform";

export type Station = {
  readonly key: string;
  readonly title: string;
  /** What the row says about this place. */
  readonly note: string;
  /** Index of the transform that is edited here. */
  readonly transform: number | undefined;
};

export function listStations(row: RowContent, target: Target, roles: Roles): Station[] {
  const steps = row.transforms.map((transform, index): Station => ({
    key: `step ${index}`,
    title: nameTransform(transform.kind),
    note: describeTransform(transform),
    transform: index,
  }));
  const node: Station = {
    key: "node",
    title: row.direction === "out" ? "Variable" : "Node",
    note: `${target.path}, ${target.dataTypeName}`,
    transform: undefined,
  };
  const source = listSourceStations(row.source, roles);
  return row.direction === "out" ? [node, ...steps, ...source.reverse()] : [...source, ...steps, node];
}

function listSourceStations(source: SourceReference, roles: Roles): Station[] {
  const plain = (title: string, note: string): Station[] => [{ key: "read", title, note, transform: undefined }];
  switch (source.kind) {
    case "process-data": {
      const field = findField(source, roles);
      return field ? listFieldStations(field) : plain("Field", "the role has no such field");
    }
    case "register":
      return plain(
        "Registers",
        `${tableWords[source.table]} ${source.address}, ${source.type ?? "UInt16"} ${source.order ?? ""}`.trim(),
      );
    case "formula":
      return plain("Formula", Object.keys(source.inputs).join(", ") || "no inputs");
    case "constant":
      return plain("Constant", String(source.value));
    default:
      return plain("Read", describePlace(source, roles));
  }
}

function findField(source: Extract<SourceReference, { kind: "process-data" }>, roles: Roles): FrameField | undefined {
  const role = roles.get(source.role);
  return role && viewRoleFrame(role, source.direction)?.fields.find((field) => field.subindex === source.subindex);
}

function listFieldStations(field: FrameField): Station[] {
  const stations: Station[] = [
    { key: "bits", title: capital(field.octetText), note: `bits ${field.bitText}`, transform: undefined },
    { key: "raw", title: "Read as", note: field.typeText, transform: undefined },
  ];
  const special = field.named.map(({ raw, text }) => `${raw} ${text}`.trim());
  if (special.length > 0) {
    const more = special.length > 2 ? ` and ${special.length - 2} more` : "";
    stations.push({
      key: "special",
      title: "Named values",
      note: special.slice(0, 2).join(", ") + more,
      transform: undefined,
    });
  }
  if (field.scaleText !== "" || field.unitText !== "") {
    stations.push({
      key: "scaled",
      title: "Scale",
      note: [field.scaleText || "as it is", field.unitText, "from the IODD"].filter(Boolean).join(", "),
      transform: undefined,
    });
  }
  return stations;
}

function capital(text: string): string {
  return text.slice(0, 1).toUpperCase() + text.slice(1);
}
