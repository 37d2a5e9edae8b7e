/** References to other servers (ExpandedNodeId, OPC 10000-6 §5.1.12) come back as they were spelled and add nothing to the tables. */
import { describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";

const file = (target: string): string => `<?xml version="1.0" encoding="utf-8"?>
<UANodeSet xmlns="http://opcfoundation.org/UA/2011/03/UANodeSet.xsd">
  <NamespaceUris><Uri>http://merrow.example/remote/</Uri></NamespaceUris>
  <ServerUris><Uri>urn:merrow:other</Uri></ServerUris>
  <Models><Model ModelUri="http://merrow.example/remote/"/></Models>
  <UAObject NodeId="ns=1;i=1" BrowseName="1:Here">
    <DisplayName>Here</DisplayName>
    <References><Reference ReferenceType="i=40">i=58</Reference><Reference ReferenceType="i=47">${target}</Reference></References>
  </UAObject>
</UANodeSet>`;

describe("a reference to another server", () => {
  it.each(["svr=1;ns=1;i=5", "svr=1;i=85", "svr=1;nsu=http://elsewhere.example/;s=Pump", "svu=urn:merrow:third;nsu=http://elsewhere.example/;i=7"])("%s", (target) => {
    const { xml } = writeNodeSet(getValue(readNodeSet(file(target))));
    expect(xml).toContain(`>${target}</Reference>`);
    expect(xml.match(/<Uri>/g)).toHaveLength(2);
  });
});
