export const editingProblemTexts: Readonly<Record<string, string>> = {
  "operation.node-exists": "There is already a node with the key {node}.",
  "operation.node-missing": "The node {node} is not there any more.",
  "operation.node-foreign": "The node {node} belongs to a required model and cannot be changed here.",
  "operation.node-in-use": "The node {node} is still used by {count} references; remove these first.",
  "operation.node-id-taken": "The NodeId {nodeId} is given already and is never given twice.",
  "operation.reference-exists": "This reference is there already.",
  "operation.reference-missing": "This reference is not there any more.",
  "operation.attribute-class": "A node of class {nodeClass} has no attribute {attribute}.",
  "operation.stale": "{attribute} of {node} was changed by somebody else meanwhile.",
};
