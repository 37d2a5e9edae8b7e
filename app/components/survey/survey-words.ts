/** The signal survey in words. Pure. */
import { signalStates, type SurveySignal } from "~/domain/mapping/mapping-parts";

export type SignalState = SurveySignal["state"];

export const stateWords: Readonly<Record<SignalState, string>> = {
  wanted: "wanted",
  open: "open",
  decided: "decided",
  built: "built",
  dropped: "dropped",
};

export const stateHints: Readonly<Record<SignalState, string>> = {
  wanted: "somebody asks for it",
  open: "how to get it is not clear",
  decided: "source or sensor is chosen",
  built: "it is a member of the type",
  dropped: "it will not be had",
};

export const deliveryWords: Readonly<Record<SurveySignal["delivery"]["kind"], string>> = {
  present: "present",
  buy: "to buy",
  none: "nothing yet",
};

export const dataTypeNames = [
  "Float",
  "Double",
  "Boolean",
  "Byte",
  "Int16",
  "UInt16",
  "Int32",
  "UInt32",
  "Int64",
  "UInt64",
  "String",
  "DateTime",
] as const;

/** Groups that a retrofitted machine usually publishes (common practice, no source), then those in use. */
export function listGroups(signals: readonly SurveySignal[]): string[] {
  const usual = ["Process", "Environment", "Configuration", "Energy", "Status"];
  return [...new Set([...usual, ...signals.map((signal) => signal.group).filter((group) => group !== "")])];
}

/** How many signals of each group are in each state; groups without signals are left out. */
export function countStates(
  signals: readonly SurveySignal[],
): { group: string; counts: Readonly<Record<SignalState, number>>; all: number }[] {
  return listGroups(signals)
    .concat(signals.some((signal) => signal.group === "") ? [""] : [])
    .map((group) => {
      const own = signals.filter((signal) => signal.group === group);
      const counts = Object.fromEntries(
        signalStates.map((state) => [state, own.filter((signal) => signal.state === state).length]),
      ) as Record<SignalState, number>;
      return { group, counts, all: own.length };
    })
    .filter(({ all }) => all > 0);
}
