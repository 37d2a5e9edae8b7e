import type { QualityRules, RowContent } from "~/domain/mapping/mapping";
import { Choice } from "./choice";
import { FigureInput } from "./commit-input";

type Props = { row: RowContent; onChange: (quality: QualityRules | undefined) => void };

/** Which status a value carries in which case; what is left alone follows the project's table. */
export function QualityEditor({ row, onChange }: Props) {
  const quality = row.quality ?? {};
  function set<K extends keyof QualityRules>(key: K, value: QualityRules[K], usual: QualityRules[K]): void {
    const { [key]: _old, ...rest } = quality;
    const next: QualityRules = value === usual ? rest : { ...rest, [key]: value };
    onChange(Object.keys(next).length === 0 ? undefined : next);
  }
  const isFormula = row.source.kind === "formula";
  return (
    <div className="grid grid-cols-2 gap-x-3 gap-y-2">
      {row.source.kind === "process-data" ? (
        <>
          <Choice
            label="Process data not valid"
            value={quality.invalid ?? "Bad"}
            options={[
              ["Bad", "Bad"],
              ["Bad_SensorFailure", "Bad_SensorFailure"],
            ]}
            onChange={(value) => set("invalid", value, "Bad")}
          />
          <Choice
            label="Out of the sensor's range"
            value={quality.outOfRange ?? "Bad_SensorFailure"}
            options={[
              ["Bad_SensorFailure", "Bad_SensorFailure, no value"],
              ["Uncertain_SensorNotAccurate", "Uncertain_SensorNotAccurate, the limit"],
            ]}
            onChange={(value) => set("outOfRange", value, "Bad_SensorFailure")}
          />
        </>
      ) : null}
      <Choice
        label="Beyond EURange"
        value={quality.beyondRange ?? "Good"}
        options={[
          ["Good", "Good"],
          ["Uncertain_EngineeringUnitsExceeded", "Uncertain_EngineeringUnitsExceeded"],
        ]}
        onChange={(value) => set("beyondRange", value, "Good")}
      />
      {isFormula ? (
        <Choice
          label="One input is Bad"
          value={quality.badInput ?? "Bad"}
          options={[
            ["Bad", "Bad, no value"],
            ["Uncertain_SubNormal", "Uncertain_SubNormal, from the others"],
          ]}
          onChange={(value) => set("badInput", value, "Bad")}
        />
      ) : null}
      <FigureInput
        label="Last value kept, in periods"
        isWhole
        low={0}
        high={1_000}
        value={quality.keepPeriods ?? 3}
        hint="as Uncertain_NoCommunicationLastUsable"
        onCommit={(value) => set("keepPeriods", value, 3)}
      />
      <Choice
        label="After that"
        value={quality.afterKeep ?? "Bad_NoCommunication"}
        options={[
          ["Bad_NoCommunication", "Bad_NoCommunication, no value"],
          ["Uncertain_NoCommunicationLastUsable", "Uncertain_NoCommunicationLastUsable, for good"],
        ]}
        onChange={(value) => set("afterKeep", value, "Bad_NoCommunication")}
      />
    </div>
  );
}
