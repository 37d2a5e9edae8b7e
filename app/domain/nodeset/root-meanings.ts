/** What an XML file is, told by its root element: so that people who took the wrong file learn which one they have. */

const BY_ROOT: Readonly<Record<string, string>> = {
  UANodeSetChanges: "a list of changes to an address space (UANodeSetChanges)",
  UANodeSetChangesStatus: "the answer to a list of changes (UANodeSetChangesStatus)",
  IODevice: "an IO-Link device description (IODD)",
  ExternalTextDocument: "a language file of an IO-Link device description (IODD)",
  IODDStandardDefinitions: "the standard definitions that belong to IO-Link device descriptions (IODD)",
  IODDStandardUnitDefinitions: "the standard units that belong to IO-Link device descriptions (IODD)",
  ModelDesign: "a source file for model compilers, not their result",
  TypeDictionary: "a binary type dictionary (.bsd)",
  html: "a web page",
  svg: "a picture (SVG)",
  rss: "a news feed",
  project: "a project file of another program",
  CAEXFile: "an AutomationML file",
  environment: "an asset administration shell in XML",
  aasenv: "an asset administration shell in XML",
  Envelope: "a SOAP message",
};

/** Plain words for the kind of document; "another XML document" when the root is not known. */
export function findRootMeaning(local: string, namespaceUri: string): string {
  if (local === "schema" && namespaceUri === "http://www.w3.org/2001/XMLSchema") {
    return "an XML schema (.xsd), such as the Types.xsd that comes with a NodeSet";
  }
  return BY_ROOT[local] ?? "another XML document";
}
