/** Where the bench can read from: ports by role and machine, and registers of the units that a machine binds. Pure. */
import type { SourceView } from "~/services/read-sources.server";
import { countRegisters } from "~/domain/mapping/decode-registers";
import type { InputReference } from "~/domain/mapping/mapping";
import type { BenchPoint } from "./bench-inputs";

export type Place = {
  readonly id: string;
  readonly sourceId: string;
  readonly port: number;
  readonly label: string;
  readonly role: string | undefined;
  readonly machine: string | undefined;
};

export function listPlaces(sources: readonly SourceView[]): Place[] {
  return sources.flatMap((source) =>
    source.ports.flatMap((port): Place[] => {
      const place = { sourceId: source.id, port: port.port };
      const name = `${source.name} port ${port.port}`;
      if (port.bindings.length === 0)
        return port.plan
          ? [{ ...place, id: `${source.id} ${port.port}`, label: name, role: undefined, machine: undefined }]
          : [];
      return port.bindings.map((binding) => ({
        ...place,
        id: `${source.id} ${port.port} ${binding.machineKey} ${binding.role}`,
        label: `${name}, ${binding.machine} ${binding.role}`,
        role: binding.role,
        machine: binding.machine,
      }));
    }),
  );
}

export function chooseFor(
  places: readonly Place[],
  roles: readonly string[],
  machine: string | undefined,
): Record<string, string> {
  return Object.fromEntries(
    roles.flatMap((role) => {
      const place = places.find((one) => one.role === role && one.machine === machine);
      return place ? [[role, place.id] as const] : [];
    }),
  );
}

export type RegisterReference = Extract<InputReference, { kind: "register" }>;

export type RegisterPlace = {
  readonly point: BenchPoint;
  readonly reference: RegisterReference;
  readonly sourceId: string;
  readonly unitId: number;
  readonly address: number;
  readonly count: number;
};

/** The registers that the mapping reads, on the units that the machine binds. */
export function listRegisterPlaces(
  points: readonly BenchPoint[],
  sources: readonly SourceView[],
  machine: string | undefined,
): RegisterPlace[] {
  return points.flatMap((point): RegisterPlace[] => {
    const { reference } = point;
    if (reference.kind !== "register") return [];
    for (const source of sources) {
      const bound = source.bindings.find((one) => one.machine === machine && one.role === reference.role);
      if (!bound) continue;
      const unitId = bound.binding.unitId ?? source.address.unitId ?? 1;
      const address = reference.address + (bound.binding.addressOffset ?? 0);
      const count =
        reference.table.endsWith("register") && reference.bit === undefined
          ? countRegisters(reference.type ?? "UInt16")
          : 1;
      return [{ point, reference, sourceId: source.id, unitId, address, count }];
    }
    return [];
  });
}
