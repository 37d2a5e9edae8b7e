export const deliverProblemTexts: Readonly<Record<string, string>> = {
  "document.too-large": "The document has {size} characters; the limit is {limit}.",
  "document.no-json": "The document is not JSON: {message}.",
  "document.format": "This is no mapping document of a kind that is read here; expected is {expected}.",
  "document.invalid": "The document does not follow its schema: {message}.",
  "deliver.no-mapping": "The type of {machine} has no mapping.",
};
