export const helpText = `ferrule – checks and rewrites OPC UA NodeSet2 files

  npm run -s ferrule -- check FILE [--with DIR]… [--json]
      Reads the file with the models it requires and runs the checker.
  npm run -s ferrule -- roundtrip IN OUT [--with DIR]…
      Reads IN and writes OUT with all nodes, references and attributes, in the order of IN.
  npm run -s ferrule -- help

  --with DIR   adds the NodeSets below DIR to the library for this call; may be given several times
  --json       prints the findings as one JSON document

Exit status: 0 nothing of severity error · 1 at least one error ·
2 unreadable file, missing required model, or wrong usage
`;
