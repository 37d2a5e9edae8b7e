/** What the checker says of sources, ports and machines' bindings, over all models of machines. */
import { listModels } from "../db/repositories/models.server";
import type { Finding } from "../domain/checks/finding";
import { checkModel } from "./check-model.server";

export type SourceFinding = Pick<Finding, "rule" | "severity" | "message" | "facts"> & {
  readonly modelId: string;
  /** Absent where a machine is meant. */
  readonly sourceId?: string;
  readonly port?: number;
  readonly machineKey?: string;
};

export async function listSourceFindings(organizationId: string): Promise<SourceFinding[]> {
  const found: SourceFinding[] = [];
  for (const model of await listModels(organizationId)) {
    const checked = model.kind === "machines" ? await checkModel(model.id) : undefined;
    for (const { rule, severity, message, facts, place } of checked?.findings ?? []) {
      if (!place) continue;
      const isMachine = place.kind === "machine";
      found.push({
        rule,
        severity,
        message,
        facts,
        modelId: model.id,
        ...(isMachine ? { machineKey: place.id } : { sourceId: place.id }),
        ...(place.port === undefined ? {} : { port: place.port }),
      });
    }
  }
  return found;
}
