export const deliverProblemTexts: Readonly<Record<string, string>> = {
  "document.too-large": "The document has {size} characters; the limit is {limit}.",
  "document.no-json": "The document is not JSON: {message}.",
  "document.format": "This is no mapping document of a kind that is read here; expected is {expected}.",
  "document.invalid": "The document does not follow its schema: {message}.",
  "deliver.no-mapping": "The type of {machine} has no mapping.",
  "deliver.choose": "Say which one is meant; the choices are {choices}.",
  "deliver.machine-only": "A Thing Description is made of a machine, not of a type.",
  "deliver.no-type": "The model has no machine type {name}.",
  "template.too-long": "The template or its text has {size} characters; the limit is {limit}.",
  "template.syntax": "The template cannot be read: {message}.",
  "template.render": "The template cannot be carried out (limit {limit} ms): {message}.",
  "template.name-taken": "There is a template with the name {name} already.",
};
