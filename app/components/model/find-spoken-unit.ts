import type { UnitFacts } from "./analog-facts";

export type UnitHit = UnitFacts & { readonly code: string };

export function searchUnits(_query: string, _limit: number): readonly UnitHit[] {
  return [];
}

export function findSpokenUnit(_text: string): UnitFacts | undefined {
  return undefined;
}

export const UNIT_TABLE = "";
export const UNIT_COUNT = 0;
