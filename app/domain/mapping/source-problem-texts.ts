export const sourceProblemTexts: Readonly<Record<string, string>> = {
  "source.unreachable": "{url} does not answer: {message}.",
  "source.no-json": "{url} answers with something else than JSON: {message}.",
  "source.answer-too-large": "The answer of {url} is larger than {limit} bytes.",
  "source.answer-unexpected": "The answer of {url} has another form than expected: {message}.",
  "source.refused": "{url} refuses with HTTP {httpStatus}, code {code}: {message}.",
  "source.modbus-exception": "Unit {unitId} answers exception {code} for {table} {address}.",
};
