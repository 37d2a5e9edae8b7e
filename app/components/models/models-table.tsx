import { Download, MoreVertical } from "lucide-react";
import { Link } from "react-router";
import { FindingShape, FindingTallyBadge } from "~/components/notation/finding-badge";
import { LocalTime } from "~/components/shell/local-time";
import { IconButton } from "~/components/ui/button";
import { Menu } from "~/components/ui/menu";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { ModelSummary } from "~/services/read-park.server";
import { formatCount } from "~/utils/format";
import { KindSketch } from "./kind-sketch";

export function ModelsTable({ models }: { models: readonly ModelSummary[] }) {
  return (
    <TableScroll label="Models">
      <Table caption="Models of the team" className="min-w-240">
        <thead>
          <tr>
            <Th>Model</Th>
            <Th>Namespace</Th>
            <Th>Version</Th>
            <Th right>Nodes</Th>
            <Th right>Edits</Th>
            <Th>Findings</Th>
            <Th>Stands on</Th>
            <Th>Last edit</Th>
            <Th className="w-8">
              <span className="sr-only">Actions</span>
            </Th>
          </tr>
        </thead>
        <tbody>
          {models.map((model) => (
            <Tr key={model.id}>
              <Td className="h-12">
                <Link to={`/models/${model.id}/sheet`} className="group flex items-center gap-3">
                  <KindSketch kind={model.kind} width={42} />
                  <span>
                    <b className="block text-body font-semibold group-hover:text-copper">{model.name}</b>
                    <span className="block text-note text-ink-3">{model.kind}</span>
                  </span>
                </Link>
              </Td>
              <Td mono className="text-ink-2">
                {model.namespaceUri}
              </Td>
              <Td mono>{model.version}</Td>
              <Td right mono>
                {formatCount(model.nodeCount)}
              </Td>
              <Td right mono>
                {formatCount(model.headSeq)}
              </Td>
              <Td>
                <Link to={`/models/${model.id}/findings`} aria-label={`Findings of ${model.name}`}>
                  <FindingTallyBadge tally={model.tally} showNone />
                </Link>
              </Td>
              <Td className="text-ink-2">
                {model.missing.length > 0 ? (
                  <span className="flex items-center gap-1.5" title={model.missing.join(" ")}>
                    <FindingShape severity="error" /> {model.missing.length} missing
                  </span>
                ) : (
                  model.requires.map(toShortName).join(" · ") || "base model"
                )}
              </Td>
              <Td className="whitespace-nowrap text-ink-2">
                {model.updatedBy}, <LocalTime iso={model.updatedAt} />
              </Td>
              <Td right>
                <Menu
                  label={`Actions of ${model.name}`}
                  align="end"
                  trigger={<IconButton icon={MoreVertical} label={`Actions of ${model.name}`} size="small" />}
                  entries={[
                    { kind: "link", label: "Sheet", to: `/models/${model.id}/sheet` },
                    { kind: "link", label: "Register", to: `/models/${model.id}/register` },
                    { kind: "link", label: "Findings", to: `/models/${model.id}/findings` },
                    { kind: "link", label: "Test server", to: `/models/${model.id}/test-server` },
                    { kind: "rule" },
                    {
                      kind: "link",
                      label: "Download NodeSet2",
                      icon: Download,
                      to: `/models/${model.id}/nodeset`,
                      download: true,
                    },
                    { kind: "link", label: "Rename, version, delete", to: `/models/${model.id}/about` },
                  ]}
                />
              </Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}

/** The last part of a model URI: `http://opcfoundation.org/UA/DI/` → `DI`. */
function toShortName(modelUri: string): string {
  return (
    modelUri
      .split(/[/:#]+/)
      .filter(Boolean)
      .at(-1) ?? modelUri
  );
}
