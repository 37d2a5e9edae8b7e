import { Link } from "react-router";
import { LocalTime } from "~/components/shell/local-time";
import { TextLink } from "~/components/ui/button";
import { Block } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { formatCount } from "~/utils/format";

export type VariantLine = {
  readonly id: string;
  readonly name: string;
  readonly edits: number;
  readonly updatedBy: string;
  readonly updatedAt: string;
};

/** Branches of the model for trials, each with the way to merge it. */
export function VariantsBlock({ variants }: { variants: readonly VariantLine[] }) {
  return (
    <Block title="Variants" about="branches for trials">
      <TableScroll label="Variants">
        <Table caption="Variants of this model">
          <thead>
            <tr>
              <Th>Variant</Th>
              <Th right>Edits</Th>
              <Th>Last edit</Th>
              <Th>
                <span className="sr-only">Merge</span>
              </Th>
            </tr>
          </thead>
          <tbody>
            {variants.map((variant) => (
              <Tr key={variant.id}>
                <RowHead>
                  <Link to={`/models/${variant.id}/sheet`} className="hover:text-copper">
                    {variant.name}
                  </Link>
                </RowHead>
                <Td right mono>
                  {formatCount(variant.edits)}
                </Td>
                <Td>
                  {variant.updatedBy}, <LocalTime iso={variant.updatedAt} />
                </Td>
                <Td right>
                  <TextLink to={`/models/${variant.id}/merge`}>Merge</TextLink>
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </Block>
  );
}
