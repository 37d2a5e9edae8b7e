import type { FieldPlan } from "../../mapping/decode-frame";
import type { InputReference, MappingRow } from "../../mapping/mapping";
import type { WiringRule } from "../rule";
import { findField, findTargetOf } from "../source-facts";
import type { WiredMapping } from "../wiring";
import { exampleMapping, exampleRow, exampleWiring, scaleField, scaledField } from "../wiring-examples";

export const r404: WiringRule = {
  id: "R404",
  title: "A measurement is scaled once",
  severity: "warning",
  clause: "OPC 30120 1.0 §12.2; common practice for the scale octet of the measuring profiles",
  priority: 2,
  concerns: "wiring",
  condition:
    "Gradient and offset of the device description are applied by decoding: neither the scale octet of the profile nor the same factor is applied a second time.",
  why: "The value is wrong by a power of ten and still moves plausibly.",
  check(wiring, _ctx, report) {
    for (const mapping of wiring.mappings) {
      for (const row of mapping.mapping.rows) {
        const target = findTargetOf(mapping, row);
        const twice = target && findSecondScaling(mapping, row);
        if (!target || twice === undefined) continue;
        report({
          key: target.key,
          message: `${target.path} is scaled twice: ${twice}.`,
          facts: [
            `Source: ${row.source.kind}`,
            "Decoding applies gradient and offset of the device description already",
          ],
        });
      }
    }
  },
  examples: {
    good: {
      text: "The gradient alone.",
      build: (m) =>
        exampleWiring(m, (c) => ({
          mappings: [
            exampleMapping(c, { dataType: "Float", fields: [scaledField(), scaleField()], rows: [exampleRow()] }),
          ],
        })),
    },
    bad: {
      text: "A formula multiplies the measurement by ten to the scale, beside the gradient.",
      build: (m) =>
        exampleWiring(
          m,
          (c) => ({
            mappings: [
              exampleMapping(c, {
                dataType: "Float",
                fields: [scaledField(), scaleField()],
                rows: [
                  exampleRow({
                    source: {
                      kind: "formula",
                      expression: "value * 10 ^ scale",
                      inputs: {
                        value: { kind: "process-data", role: "sensor", direction: "in", subindex: 1 },
                        scale: { kind: "process-data", role: "sensor", direction: "in", subindex: 2 },
                      },
                    },
                  }),
                ],
              }),
            ],
          }),
          "target",
        ),
    },
  },
};

function findSecondScaling(mapping: WiredMapping, row: MappingRow): string | undefined {
  const field = findField(mapping, row);
  if (
    field &&
    field.gradient !== 1 &&
    row.transforms.some((t) => t.kind === "linear" && t.gradient === field.gradient)
  ) {
    return `the device description says × ${field.gradient}, the row says it again`;
  }
  if (row.source.kind !== "formula") return undefined;
  const fields = Object.values(row.source.inputs).flatMap((input) =>
    input.kind === "member" ? [] : (fieldOf(mapping, input) ?? []),
  );
  const scale = fields.find(isScaleOctet);
  const measured = fields.find((f) => f.gradient !== 1);
  return scale && measured
    ? `gradient × ${measured.gradient} of ${measured.id} and the scale in ${scale.id}`
    : undefined;
}

function fieldOf(mapping: WiredMapping, source: InputReference): FieldPlan | undefined {
  return findField(mapping, { source });
}

/** The scale of the measuring profiles is a signed octet that carries a power of ten. */
function isScaleOctet({ id, type }: FieldPlan): boolean {
  return type.kind === "IntegerT" && type.bitLength === 8 && /scale|skal/i.test(id);
}
