import { useSyncExternalStore } from "react";
import { useEditorState, useOpenModel } from "~/components/model/use-model";
import { ModelTitleBlock } from "./model-title-block";

/** The title block of the open model, as its window sees it now. */
export function ModelFoot() {
  const { workspace, findings, isReady } = useOpenModel();
  const { space, seq } = useEditorState();
  const found = useSyncExternalStore(findings.subscribe, findings.getState, findings.getState);
  return (
    <ModelTitleBlock
      workspace={workspace}
      seq={seq}
      nodeCount={isReady ? space.own.nodes.size : workspace.model.nodeCount}
      tally={found.isKnown ? found.tally : undefined}
    />
  );
}
