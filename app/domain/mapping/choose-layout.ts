/** Which of several alternative process data layouts a device uses now. */
import { fail, ok, problem, type Result } from "../core/result";
import type { DeviceDescription, Direction, ProcessDataImage } from "../iodd/device-description";

/**
 * The image of a direction. Where layouts are conditional, `condition` is the present value of the deciding parameter;
 * without it the answer is `decode.condition-needed` with the choices. A device without process data in this direction
 * answers `decode.no-process-data`.
 */
export function chooseLayout(
  device: DeviceDescription,
  direction: Direction,
  condition?: string,
): Result<ProcessDataImage> {
  const layouts = device.processData.filter((p) => p[direction] !== undefined);
  const conditional = layouts.filter((p) => p.condition !== undefined);
  const [first] = layouts;
  if (!first) return fail(problem("decode.no-process-data"));
  const variableId = conditional[0]?.condition?.variableId ?? "";
  const choices = conditional.map((p) => p.condition?.value ?? "").join(", ");
  const answer = (image: ProcessDataImage | undefined): Result<ProcessDataImage> =>
    image ? ok(image) : fail(problem("decode.no-process-data"));

  if (condition !== undefined) {
    const met = conditional.find((p) => isSameValue(p.condition?.value ?? "", condition));
    if (met) return answer(met[direction]);
    if (conditional.length > 0)
      return fail(problem("decode.condition-unknown", { variableId, value: condition, choices }));
    return answer(first[direction]);
  }
  if (conditional.length === 0) return answer(first[direction]);
  // All alternatives may share this direction's image (only the other one differs); then nothing needs to be asked.
  const ids = new Set(layouts.map((p) => p[direction]?.id));
  if (ids.size === 1) return answer(first[direction]);
  return fail(problem("decode.condition-needed", { variableId, choices }));
}

function isSameValue(a: string, b: string): boolean {
  const [left, right] = [a.trim(), b.trim()];
  return left === right || (left !== "" && right !== "" && Number(left) === Number(right));
}
