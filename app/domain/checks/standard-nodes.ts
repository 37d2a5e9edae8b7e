/**
 * Further nodes of namespace 0 that rules ask for, by number in Opc.Ua.NodeSet2.xml 1.05; compared with that file by
 * `tests/unit/domain/checks/standard-nodes.test.ts`.
 */
import { standardKey } from "../address-space/node-id";

export const StandardNode = {
  FromState: standardKey(51),
  ToState: standardKey(52),
  HasArgumentDescription: standardKey(129),
  HasOptionalInputArgumentDescription: standardKey(131),
  Duration: standardKey(290),
  Server: standardKey(2253),
  StateMachineType: standardKey(2299),
  StateType: standardKey(2307),
  TransitionType: standardKey(2310),
  FiniteStateMachineType: standardKey(2771),
  ConditionType: standardKey(2782),
  HasCondition: standardKey(9006),
  ArrayItemType: standardKey(12021),
  HasFieldDescription: standardKey(19815),
  RoleType: standardKey(15620),
  HasDictionaryEntry: standardKey(17597),
  DictionaryEntryType: standardKey(17589),
  IsDeprecated: standardKey(23562),
  AssociatedWith: standardKey(24137),
  HasStructuredComponent: standardKey(24136),
  AllowedSubtype: standardKey(19819),
  HasDataTypeRefinement: standardKey(19846),
  Decimal: standardKey(50),
  IdType: standardKey(256),
  NumericRange: standardKey(291),
  Counter: standardKey(289),
  Index: standardKey(17588),
  IntegerId: standardKey(288),
  YArrayItemType: standardKey(12029),
  XYArrayItemType: standardKey(12038),
  ImageItemType: standardKey(12047),
  CubeItemType: standardKey(12057),
  NDimensionArrayItemType: standardKey(12068),
} as const;
