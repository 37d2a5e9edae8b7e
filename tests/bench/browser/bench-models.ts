/** The models that the browser benchmark works on, as NodeSet2 files for the import. */
import { StandardDataType as D } from "~/domain/address-space/standard-ids";
import type { NodeKey } from "~/domain/address-space/node-id";
import { ExampleModel } from "~/domain/checks/example-model";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { makeLargeModel } from "../../support/large-model";

export const GRID = { columns: 25, stepX: 340, stepY: 240 } as const;

export type CardModel = { readonly xml: string; readonly keys: readonly NodeKey[] };

/** ObjectTypes with five members each; every second one has a reference to its neighbour, so that lines are drawn too. */
export function makeCardModel(cards: number, name: string): CardModel {
  const model = new ExampleModel(`http://example.org/UA/${name}/`);
  const feeds = model.referenceType("Feeds", { inverseName: "FedBy" });
  const keys = Array.from({ length: cards }, (_, index) => {
    const parent = model.objectType(`Station${index}Type`);
    for (let member = 0; member < 5; member++)
      model.variable(`Reading${member}`, { parent, rule: "Mandatory", dataType: D.Float });
    return parent;
  });
  for (let at = 1; at < cards; at += 2) model.reference(keys[at - 1] as NodeKey, feeds, keys[at] as NodeKey);
  return { xml: writeNodeSet(model.build()).xml, keys };
}

/** A model whose every node is a row of the register as it opens: Objects with plain Variables. */
export function makeRowModel(rows: number, name: string): string {
  const model = new ExampleModel(`http://example.org/UA/${name}/`);
  for (let made = 0; made < rows;) {
    const line = model.object(`Line${made}`);
    made++;
    for (let g = 0; g < 10 && made < rows; g++) {
      const parent = model.object(`Group${g}`, { parent: line });
      made++;
      for (let v = 0; v < 24 && made < rows; v++, made++)
        model.variable(`Reading${v}`, { parent, dataType: D.Float });
    }
  }
  return writeNodeSet(model.build()).xml;
}

/** Machine types with analog members and machines of these types, on DI and Machinery. */
export function makeMachineModel(nodes: number): string {
  return writeNodeSet(makeLargeModel(nodes)).xml;
}
