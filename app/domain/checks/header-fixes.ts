/** Fixes of the model's header: one field is set anew. */
import type { AddressSpace } from "../address-space/address-space";
import type { ModelEntry, ModelHeader } from "../address-space/model-header";
import { ok } from "../core/result";
import type { Finding } from "./finding";
import { notPossible } from "./fixes";
import type { Fix } from "./rule";

/** `valueOf` answers the new value of the field, undefined where there is nothing to do. */
export function headerFix<F extends keyof ModelHeader>(
  label: string,
  field: F,
  valueOf: (header: ModelHeader, finding: Finding, space: AddressSpace) => ModelHeader[F] | undefined,
): Fix {
  return {
    label,
    apply(space, finding) {
      const value = valueOf(space.own.header, finding, space);
      return value === undefined ? notPossible(finding) : ok([{ kind: "setHeader", field, value }]);
    },
  };
}

/** Replaces rows of Models; `change` answers the row itself where it stays. */
export function modelsFix(
  label: string,
  change: (model: ModelEntry, finding: Finding, space: AddressSpace) => ModelEntry,
): Fix {
  return headerFix(label, "models", (header, finding, space) => {
    if (finding.data?.["modelUri"] === undefined) return undefined;
    const models = header.models.map((m) =>
      m.modelUri === finding.data?.["modelUri"] ? change(m, finding, space) : m,
    );
    return models.some((m, i) => m !== header.models[i]) ? models : undefined;
  });
}

/** A row for RequiredModel that asks for a model as it is loaded. */
export function toRequirement({ modelUri, version, modelVersion, publicationDate }: ModelEntry): ModelEntry {
  return {
    modelUri,
    ...(version === undefined ? {} : { version }),
    ...(modelVersion === undefined ? {} : { modelVersion }),
    ...(publicationDate === undefined ? {} : { publicationDate }),
    requiredModels: [],
  };
}
