import { FindingTallyBadge, type FindingTally } from "~/components/notation/finding-badge";
import { LocalTime } from "~/components/shell/local-time";
import { TitleBlock, type TitleCell } from "~/components/ui/title-block";
import type { ModelWorkspace } from "~/presenters/model-workspace.server";
import { formatCount } from "~/utils/format";

export type ModelTitleFacts = {
  readonly workspace: ModelWorkspace;
  /** As they are now: the loader's figures age while people edit. */
  readonly seq: number;
  readonly nodeCount: number;
  readonly tally: FindingTally | undefined;
};

const toShortName = (uri: string) =>
  uri
    .split(/[/:#]+/)
    .filter(Boolean)
    .at(-1) ?? uri;

/** The cells of the title block of a model. */
function listTitleCells({ workspace, seq, nodeCount, tally }: ModelTitleFacts): TitleCell[] {
  const { model, layers, pins, problems } = workspace;
  const nameOf = (uri: string) => {
    const pin = pins.find((one) => one.modelUri === uri);
    return pin ? `${toShortName(uri)} r${pin.number}` : uri.endsWith("opcfoundation.org/UA/") ? "UA" : toShortName(uri);
  };
  const missing = problems.filter((problem) => problem.severity === "error").length;
  return [
    { label: "Model", value: model.name, strong: true },
    { label: "Namespace", value: model.namespaceUri, mono: true },
    { label: "Version", value: model.version ?? "none", mono: true },
    {
      label: "State",
      value: seq === 0 ? "as it came here" : `${formatCount(seq)} ${seq === 1 ? "edit" : "edits"} since it came here`,
    },
    { label: "Nodes", value: formatCount(nodeCount), mono: true },
    {
      label: "Drawn",
      value: (
        <>
          {model.updatedBy}, <LocalTime iso={model.updatedAt} parts="date" />
        </>
      ),
    },
    { label: "Findings", value: tally ? <FindingTallyBadge tally={tally} showNone /> : "not checked yet" },
    {
      label: "Stands on",
      value:
        missing > 0
          ? `${missing} required missing`
          : layers.map((layer) => nameOf(layer.modelUri)).join(" · "),
      mono: missing === 0,
    },
  ];
}

export function ModelTitleBlock(facts: ModelTitleFacts) {
  return <TitleBlock label={`Title block of ${facts.workspace.model.name}`} cells={listTitleCells(facts)} />;
}
