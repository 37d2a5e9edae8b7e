/** Problems of comparing, merging, retargeting and splitting models. */
export const compareProblemTexts: Readonly<Record<string, string>> = {
  "merge.node-id-twice": "{first} and {second} would both have the NodeId {nodeId}; renumber one of them first.",
  "merge.open-conflicts": "{count} conflicts wait for a choice.",
  "split.nothing": "Choose at least one type of the model.",
  "split.depends-on-rest":
    "{path} uses {other}, which stays; take it along, or it would need the model that it leaves.",
  "split.uri": "“{uri}” is no namespace URI, or the model or one of its required models has it already.",
};
