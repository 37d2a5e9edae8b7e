export const mappingProblemTexts: Readonly<Record<string, string>> = {
  "formula.syntax": "The formula cannot be read: {message}.",
  "formula.not-allowed":
    "The formula may not contain {what}; use numbers, names, + − * / ^ %, comparisons, conditions and functions such as min or abs.",
  "formula.too-long": "The formula has {count} parts; the limit is {limit}.",
  "formula.unknown-name": "The formula names {name}, which is no input; the inputs are {choices}.",
  "transform.unit-dimension": "{from} cannot be converted to {to}: they measure different things.",
  "mapping.target-twice": "{target} is fed by two rows.",
  "mapping.formula-cycle": "Formulas read each other in a circle.",
  "mapping.unknown-role": "The mapping has no role {role}; its roles are {choices}.",
  "mapping.unknown-member": "A formula reads {target}, which the mapping does not feed.",
  "mapping.unknown-field": "The device of {role} has no field with subindex {subindex} in direction {direction}.",
  "mapping.no-device": "No device description is attached to the role {role}.",
  "mapping.constant-input": "The input {name} is a constant; write it into the formula.",
  "transform.lookup-order": "The lookup table gives two values for one input.",
  "frame.empty": "There are no bytes yet.",
  "frame.text":
    "These are no bytes: write hexadecimal pairs (04 D2 17 01), decimal octets (4, 210, 23, 1) or a master's answer in JSON.",
  "frame.octet": "Position {position} holds {value}; an octet is a whole number from 0 to 255.",
  "frame.answer": "The answer holds no octets: its ioLink member needs a value that is a list of octets.",
  "frame.answer-direction": "The answer has no {member}.",
  "frame.too-long": "That is more than {limit} octets.",
};
