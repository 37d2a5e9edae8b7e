/** The six braiders of the demo's hall. Names, serial numbers and years are invented. */

export type HallMachine = {
  readonly name: string;
  readonly serialNumber: string;
  readonly yearOfConstruction: number;
  readonly location: string;
  readonly recipeNumber: number;
  /** The older controllers of B1 and B2 count no picks. */
  readonly countsPicks: boolean;
};

function machine(number: number, yearOfConstruction: number, recipeNumber: number): HallMachine {
  return {
    name: `B${number}`,
    serialNumber: `MR-${yearOfConstruction}-${String(number).padStart(2, "0")}`,
    yearOfConstruction,
    location: `Hall 1, bay ${number}`,
    recipeNumber,
    countsPicks: number > 2,
  };
}

export const hallMachines: readonly HallMachine[] = [
  machine(1, 1998, 12),
  machine(2, 1998, 12),
  machine(3, 2003, 7),
  machine(4, 2003, 9),
  machine(5, 2008, 21),
  machine(6, 2011, 21),
];

export const MANUFACTURER = "Merrow Ropeworks";
export const PRODUCT_MODEL = "Rope braider";

/** A URI below the works' own invented domain, unique for each machine. */
export function productInstanceUri(machine: HallMachine): string {
  return `http://merrow.example/braiders/${machine.serialNumber}`;
}
