/**
 * Keys of nodes of namespace 0 that the code asks for by identity. Numbers: Opc.Ua.NodeSet2.xml 1.05 of the npm package
 * node-opcua-nodesets; `tests/unit/domain/address-space/standard-ids.test.ts` compares each with that file.
 */
import { standardKey } from "./node-id";

export const StandardReferenceType = {
  References: standardKey(31),
  NonHierarchicalReferences: standardKey(32),
  HierarchicalReferences: standardKey(33),
  HasChild: standardKey(34),
  Organizes: standardKey(35),
  HasEventSource: standardKey(36),
  HasModellingRule: standardKey(37),
  HasEncoding: standardKey(38),
  HasDescription: standardKey(39),
  HasTypeDefinition: standardKey(40),
  GeneratesEvent: standardKey(41),
  Aggregates: standardKey(44),
  HasSubtype: standardKey(45),
  HasProperty: standardKey(46),
  HasComponent: standardKey(47),
  HasNotifier: standardKey(48),
  HasOrderedComponent: standardKey(49),
  AlwaysGeneratesEvent: standardKey(3065),
  HasInterface: standardKey(17603),
  HasAddIn: standardKey(17604),
} as const;

export const StandardType = {
  BaseObjectType: standardKey(58),
  FolderType: standardKey(61),
  BaseVariableType: standardKey(62),
  BaseDataVariableType: standardKey(63),
  PropertyType: standardKey(68),
  DataTypeEncodingType: standardKey(76),
  ModellingRuleType: standardKey(77),
  BaseEventType: standardKey(2041),
  DataItemType: standardKey(2365),
  AnalogItemType: standardKey(2368),
  DiscreteItemType: standardKey(2372),
  TwoStateDiscreteType: standardKey(2373),
  MultiStateDiscreteType: standardKey(2376),
  MultiStateValueDiscreteType: standardKey(11238),
  NamespaceMetadataType: standardKey(11616),
  BaseInterfaceType: standardKey(17602),
  BaseAnalogType: standardKey(15318),
  AnalogUnitType: standardKey(17497),
  AnalogUnitRangeType: standardKey(17570),
} as const;

export const StandardModellingRule = {
  Mandatory: standardKey(78),
  Optional: standardKey(80),
  ExposesItsArray: standardKey(83),
  OptionalPlaceholder: standardKey(11508),
  MandatoryPlaceholder: standardKey(11510),
} as const;

export const StandardDataType = {
  Boolean: standardKey(1),
  SByte: standardKey(2),
  Byte: standardKey(3),
  Int16: standardKey(4),
  UInt16: standardKey(5),
  Int32: standardKey(6),
  UInt32: standardKey(7),
  Int64: standardKey(8),
  UInt64: standardKey(9),
  Float: standardKey(10),
  Double: standardKey(11),
  String: standardKey(12),
  DateTime: standardKey(13),
  Guid: standardKey(14),
  ByteString: standardKey(15),
  XmlElement: standardKey(16),
  NodeId: standardKey(17),
  ExpandedNodeId: standardKey(18),
  StatusCode: standardKey(19),
  QualifiedName: standardKey(20),
  LocalizedText: standardKey(21),
  Structure: standardKey(22),
  DataValue: standardKey(23),
  BaseDataType: standardKey(24),
  DiagnosticInfo: standardKey(25),
  Number: standardKey(26),
  Integer: standardKey(27),
  UInteger: standardKey(28),
  Enumeration: standardKey(29),
  Argument: standardKey(296),
  Range: standardKey(884),
  EUInformation: standardKey(887),
  EnumValueType: standardKey(7594),
  OptionSet: standardKey(12755),
  Union: standardKey(12756),
} as const;

export const StandardObject = {
  RootFolder: standardKey(84),
  ObjectsFolder: standardKey(85),
  TypesFolder: standardKey(86),
  ViewsFolder: standardKey(87),
  ServerNamespaces: standardKey(11715),
} as const;
