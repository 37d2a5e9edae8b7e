export const helpText = `ferrule – checks, compares and rewrites OPC UA NodeSet2 files, reads IO-Link device descriptions

  npm run -s ferrule -- check FILE [--with DIR]… [--format text|json|sarif] [--severity S] [--waivers FILE]
        [--conventions FILE] [--mapping DOCUMENT]
      Validates the file against UANodeSet.xsd, reads it with the models it requires and runs the checker.
  npm run -s ferrule -- rules [RULE] [--json]
      The rules of the checker: number, severity, clause, whether there is a fix; and those that do not run, with the reason.
      With a RULE, as R023: what must hold, what happens where it does not, a good and a bad example.
  npm run -s ferrule -- roundtrip IN OUT [--canonical] [--with DIR]…
      Reads IN and writes OUT with all nodes, references and attributes, in the order of IN. --canonical: types first, owners
      before what they own, else by NodeId, so that two files of one model differ only where the model does.
  npm run -s ferrule -- compare OLD NEW [--with DIR]… [--json]
      What changed from OLD to NEW, by meaning: each change rated breaking, additive or neutral, with the clause.
  npm run -s ferrule -- verify BUNDLE [--key FILE] [--json]
      Whether a release's bundle is whole and signed: every file against the manifest, the manifest against its Ed25519
      signature, and with --key (the organisation's public key, PEM) whether it is that key.
  npm run -s ferrule -- device FILE [--json]
      What an IODD says: one XML file, or the ZIP that it came in.
  npm run -s ferrule -- decode FILE HEX [--direction in|out] [--condition VALUE] [--json]
      One frame of the device's process data. HEX: pairs in the order of transmission, spaces allowed.
  npm run -s ferrule -- map DOCUMENT --frame SOURCE=HEX… [--json]
      Node values with status codes that a mapping document makes of one frame a source (SOURCE:out=HEX: what was set).
  npm run -s ferrule -- as-built FILE ENDPOINT [--with DIR]… [--watch SECONDS] [--ignore PATTERN]…
        [--fingerprint SHA256] [--security sign-and-encrypt|sign|none] [--user NAME] [--pki DIR] [--json]
      Whether the server at opc.tcp://HOST:PORT serves what FILE says: namespaces, versions, nodes, types, units, ranges, access,
      values of properties; with --watch whether values come and are good. It reads, and writes nothing.
      Without --fingerprint it prints that of the server's certificate, for you to compare, and ends with 2.
      --ignore: paths or NodeIds that do not count, * for any characters. --security none: unprotected, bench use only.
      --user: the password comes from FERRULE_PASSWORD. --pki: keeps the client's certificate there, for servers that have to
      trust it first.
  npm run -s ferrule -- help

  --with DIR   adds the NodeSets below DIR to the library for this call; may be given several times
  --json       prints the findings as one JSON document; for check the same as --format json
  --severity S error, warning or hint: lists findings of this severity and above, and lets them decide the exit status
  --waivers FILE   a JSON file {"waivers":[{rule,nodeId,attribute?,reason,person,date,fingerprint}]}: accepted findings are
               left out (in SARIF: suppressed) while the node stays as its fingerprint says
  --mapping DOCUMENT   checks the mapping of a machine type against the model and runs its check cases
  --conventions FILE   a JSON file {"names":{NODECLASS:PATTERN…},"language":"en","unitInDescription":true}: rules of the team

Exit status: 0 nothing of severity error · 1 at least one error (check --severity S: one of S or above) ·
2 unreadable file, missing required model, or wrong usage.
as-built: 0 as released · 1 differs · 2 not reached, not shown, or unreadable.
verify: 0 everything fits · 1 something does not · 2 unreadable.
compare: 0 no change or neutral ones only · 1 additive · 3 breaking · 2 unreadable.
decode: 2 also for a frame of the wrong length and where --condition must say which layout is meant.
`;
