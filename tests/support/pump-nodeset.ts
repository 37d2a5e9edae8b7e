/** A small NodeSet2 file of our own: one ObjectType with one Variable and one Property. */
export const pumpUri = "http://merrow.example/UA/Pump/";

export function writePumpNodeSet(
  options: { uri?: string; version?: string; required?: string; extraNodes?: string } = {},
): string {
  const { uri = pumpUri, version = "1.0.0", required = "", extraNodes = "" } = options;
  return `<?xml version="1.0" encoding="utf-8"?>
<UANodeSet xmlns="http://opcfoundation.org/UA/2011/03/UANodeSet.xsd">
  <NamespaceUris>
    <Uri>${uri}</Uri>
  </NamespaceUris>
  <Models>
    <Model ModelUri="${uri}" Version="${version}" PublicationDate="2026-05-04T00:00:00Z">
      <RequiredModel ModelUri="http://opcfoundation.org/UA/" Version="1.05.03" PublicationDate="2023-12-15T00:00:00Z"/>${required}
    </Model>
  </Models>
  <Aliases>
    <Alias Alias="Float">i=10</Alias>
    <Alias Alias="String">i=12</Alias>
    <Alias Alias="HasComponent">i=47</Alias>
    <Alias Alias="HasProperty">i=46</Alias>
    <Alias Alias="HasSubtype">i=45</Alias>
    <Alias Alias="HasTypeDefinition">i=40</Alias>
    <Alias Alias="HasModellingRule">i=37</Alias>
  </Aliases>
  <UAObjectType NodeId="ns=1;i=1001" BrowseName="1:PumpType">
    <DisplayName>PumpType</DisplayName>
    <References>
      <Reference ReferenceType="HasSubtype" IsForward="false">i=58</Reference>
    </References>
  </UAObjectType>
  <UAVariable NodeId="ns=1;i=1002" BrowseName="1:Speed" ParentNodeId="ns=1;i=1001" DataType="Float">
    <DisplayName>Speed</DisplayName>
    <References>
      <Reference ReferenceType="HasComponent" IsForward="false">ns=1;i=1001</Reference>
      <Reference ReferenceType="HasTypeDefinition">i=63</Reference>
      <Reference ReferenceType="HasModellingRule">i=78</Reference>
    </References>
  </UAVariable>
  <UAVariable NodeId="ns=1;i=1003" BrowseName="1:Maker" ParentNodeId="ns=1;i=1001" DataType="String">
    <DisplayName>Maker</DisplayName>
    <References>
      <Reference ReferenceType="HasProperty" IsForward="false">ns=1;i=1001</Reference>
      <Reference ReferenceType="HasTypeDefinition">i=68</Reference>
      <Reference ReferenceType="HasModellingRule">i=80</Reference>
    </References>
  </UAVariable>${extraNodes}
</UANodeSet>
`;
}
