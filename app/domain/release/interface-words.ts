/** The few words of the interface document, in the languages that we write; other languages of a model get English ones. */
export type InterfaceWords = Readonly<
  Record<
    | "title"
    | "contents"
    | "namespace"
    | "version"
    | "published"
    | "revision"
    | "reading"
    | "readingAbout"
    | "type"
    | "machine"
    | "basedOn"
    | "isOfType"
    | "member"
    | "nodeId"
    | "dataType"
    | "unit"
    | "range"
    | "access"
    | "meaning"
    | "optional"
    | "methods"
    | "input"
    | "output"
    | "none"
    | "events"
    | "enumerations"
    | "value"
    | "name"
    | "read"
    | "write"
    | "readWrite"
    | "noAccess",
    string
  >
>;

const en: InterfaceWords = {
  title: "Interface",
  contents: "Contents",
  namespace: "Namespace",
  version: "Version",
  published: "Published",
  revision: "Revision",
  reading: "Reading a value",
  readingAbout:
    "Ask the server for the index of the namespace; it may differ from server to server and from start to start.",
  type: "Type",
  machine: "Machine",
  basedOn: "based on",
  isOfType: "of type",
  member: "Member",
  nodeId: "NodeId",
  dataType: "Data type",
  unit: "Unit",
  range: "Range",
  access: "Access",
  meaning: "Meaning",
  optional: "optional",
  methods: "Methods",
  input: "Passed",
  output: "Answered",
  none: "nothing",
  events: "Events",
  enumerations: "Meaning of values",
  value: "Value",
  name: "Name",
  read: "read",
  write: "write",
  readWrite: "read and write",
  noAccess: "none",
};

const de: InterfaceWords = {
  title: "Schnittstelle",
  contents: "Inhalt",
  namespace: "Namensraum",
  version: "Version",
  published: "Veröffentlicht",
  revision: "Revision",
  reading: "Einen Wert lesen",
  readingAbout:
    "Den Index des Namensraums beim Server erfragen; er kann je Server und nach jedem Start ein anderer sein.",
  type: "Typ",
  machine: "Maschine",
  basedOn: "beruht auf",
  isOfType: "vom Typ",
  member: "Mitglied",
  nodeId: "NodeId",
  dataType: "Datentyp",
  unit: "Einheit",
  range: "Bereich",
  access: "Zugriff",
  meaning: "Bedeutung",
  optional: "optional",
  methods: "Methoden",
  input: "Übergeben",
  output: "Zurückgegeben",
  none: "nichts",
  events: "Ereignisse",
  enumerations: "Bedeutung der Werte",
  value: "Wert",
  name: "Name",
  read: "lesen",
  write: "schreiben",
  readWrite: "lesen und schreiben",
  noAccess: "keiner",
};

const fr: InterfaceWords = {
  title: "Interface",
  contents: "Sommaire",
  namespace: "Espace de noms",
  version: "Version",
  published: "Publié",
  revision: "Révision",
  reading: "Lire une valeur",
  readingAbout:
    "Demander au serveur l’indice de l’espace de noms ; il peut varier d’un serveur à l’autre et après chaque démarrage.",
  type: "Type",
  machine: "Machine",
  basedOn: "fondé sur",
  isOfType: "de type",
  member: "Membre",
  nodeId: "NodeId",
  dataType: "Type de données",
  unit: "Unité",
  range: "Plage",
  access: "Accès",
  meaning: "Signification",
  optional: "facultatif",
  methods: "Méthodes",
  input: "Transmis",
  output: "Rendu",
  none: "rien",
  events: "Événements",
  enumerations: "Signification des valeurs",
  value: "Valeur",
  name: "Nom",
  read: "lecture",
  write: "écriture",
  readWrite: "lecture et écriture",
  noAccess: "aucun",
};

const words: Readonly<Record<string, InterfaceWords>> = { en, de, fr };

export function getInterfaceWords(language: string): InterfaceWords {
  return words[language] ?? en;
}
