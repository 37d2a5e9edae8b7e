/**
 * Which layer may import what. The table is the whole rule: a layer that is not named in `mayImport` is forbidden, and
 * there is no list of exemptions. What is unlike a plain reading is explained in DEVELOPERS.md, "Layers".
 */

export type LayerName =
  | "domain"
  | "editor"
  | "ui"
  | "components"
  | "db"
  | "opcua"
  | "sources"
  | "library"
  | "permissions"
  | "auth"
  | "services"
  | "presenters"
  | "root"
  | "routes"
  | "cli"
  | "utils"
  | "entry";

export type LayerRule = {
  name: LayerName;
  /** Files of the layer; the first rule that fits wins. */
  files: RegExp;
  mayImport: readonly LayerName[];
  /** Layers whose types may be named, while their code stays out. */
  mayImportTypesOf?: readonly LayerName[];
  /** Packages beside those of `packageHomes`; absent means that any package without a home may be used. */
  packages?: readonly string[];
  /** Whether Node.js modules may be used. */
  node: boolean;
  /** What to do instead of a forbidden import. */
  advice: string;
};

export const layerRules: readonly LayerRule[] = [
  {
    name: "domain",
    files: /^app\/domain\//,
    mayImport: ["domain"],
    packages: ["zod", "saxes", "fflate", "mathjs"],
    node: false,
    advice:
      "The domain is pure: pass in what it needs as a value or a function, and let a service, component or process call it.",
  },
  {
    name: "editor",
    files: /^app\/editor\//,
    mayImport: ["domain", "editor"],
    packages: ["zod"],
    node: false,
    advice:
      "The editor's logic runs without React and without a server: pass in fetch, clock and ids; keep hooks in components.",
  },
  {
    name: "ui",
    files: /^app\/components\/ui\//,
    mayImport: ["ui"],
    packages: ["react", "react-dom", "react-router", "radix-ui", "lucide-react"],
    node: false,
    advice:
      "components/ui knows no word of the product: move the piece to components/<subject>, or pass in what it shows.",
  },
  {
    name: "components",
    files: /^app\/components\//,
    mayImport: ["domain", "editor", "ui", "components", "permissions", "utils"],
    mayImportTypesOf: ["presenters", "services", "auth"],
    node: false,
    advice: "A component shows what the loader gave it: read in a presenter, write through a route's action.",
  },
  {
    name: "db",
    files: /^app\/db\//,
    mayImport: ["domain", "db", "permissions", "utils"],
    node: true,
    advice: "The database layer stores rows: put the use case into a service and call the repository from there.",
  },
  {
    name: "opcua",
    files: /^app\/opcua\//,
    mayImport: ["domain", "opcua", "utils"],
    node: true,
    advice: "The OPC UA layer gets what it serves as a message or an argument: let a service read it and pass it in.",
  },
  {
    name: "sources",
    files: /^app\/sources\//,
    mayImport: ["domain", "sources", "utils"],
    node: true,
    advice: "A source gets its settings as an argument: let a service read them and pass them in.",
  },
  {
    name: "library",
    files: /^app\/library\//,
    mayImport: ["domain", "library", "utils"],
    node: true,
    advice: "The library knows files and packs only: let a service join it with the database.",
  },
  {
    name: "permissions",
    files: /^app\/auth\/permissions\.ts$/,
    mayImport: [],
    packages: [],
    node: false,
    advice: "The permission table is shared by server and screens: it names roles and actions, nothing else.",
  },
  {
    name: "auth",
    files: /^app\/auth\//,
    mayImport: ["domain", "db", "auth", "permissions", "utils"],
    node: true,
    advice:
      "Sign-in and permissions stand below the services: turn the call around, so that the service asks for the permission.",
  },
  {
    name: "services",
    files: /^app\/services\//,
    mayImport: ["domain", "library", "db", "opcua", "sources", "auth", "permissions", "services", "utils"],
    node: true,
    advice: "A service writes and answers a Result: the route shapes the answer, a presenter reads for the page.",
  },
  {
    name: "presenters",
    files: /^app\/presenters\//,
    mayImport: ["domain", "library", "db", "opcua", "auth", "permissions", "presenters", "utils"],
    node: true,
    advice: "A presenter only reads: move what both need into a repository, and what writes into a service.",
  },
  {
    name: "cli",
    files: /^app\/cli\//,
    mayImport: ["domain", "library", "opcua", "services", "cli", "utils"],
    node: true,
    advice: "The command line runs over the domain and services: share logic with a page through one of those.",
  },
  {
    name: "utils",
    files: /^app\/utils\//,
    mayImport: ["domain", "utils"],
    node: true,
    advice: "A helper that needs a layer belongs into that layer.",
  },
  {
    name: "entry",
    files: /^app\/(server\.ts|entry\.server\.tsx|entry\.client\.tsx|routes\.ts)$/,
    mayImport: ["domain", "services", "opcua", "auth", "permissions", "db", "utils"],
    node: true,
    advice: "The entries only start, connect and stop: move the logic into a service.",
  },
  {
    name: "root",
    files: /^app\/root\.tsx$/,
    mayImport: ["domain", "editor", "services", "presenters", "components", "ui", "auth", "permissions", "utils"],
    node: false,
    advice:
      "A route parses, authorises, calls and answers: what two routes share belongs into a component, a presenter or a service.",
  },
  {
    name: "routes",
    files: /^app\/routes\//,
    mayImport: ["domain", "editor", "services", "presenters", "components", "ui", "auth", "permissions", "utils"],
    mayImportTypesOf: ["root"],
    node: false,
    advice:
      "A route parses, authorises, calls and answers: what two routes share belongs into a component, a presenter or a service.",
  },
];

/** Packages that exactly one place knows, so that they can be replaced there. */
export const packageHomes: Readonly<Record<string, RegExp>> = {
  "node-opcua": /^app\/opcua\//,
  "node-opcua-nodesets": /^app\/library\//,
  "libxml2-wasm": /^app\/library\//,
  "drizzle-orm": /^app\/db\//,
  "@libsql/client": /^app\/db\//,
  "better-auth": /^app\/auth\//,
  "@xyflow/react": /^app\/components\/sheet\//,
  elkjs: /^app\/components\/sheet\//,
  "monaco-editor": /^app\/components\/xml\//,
  uplot: /^app\/components\//,
  express: /^app\/server\.ts$/,
  "@react-router/express": /^app\/server\.ts$/,
  "@react-router/dev": /^app\/routes\.ts$/,
};

/** Folders that app/domain consists of. */
export const domainAreas: readonly string[] = [
  "core",
  "address-space",
  "editing",
  "instantiation",
  "nodeset",
  "checks",
  "compare",
  "units",
  "iodd",
  "tags",
  "mapping",
  "deliver",
  "simulation",
  "live",
  "as-built",
  "release",
];

/** Everything that may stand at the top of the project. */
export const topLevelEntries: readonly string[] = [
  ".ci",
  ".gitignore",
  ".npmrc",
  ".prettierignore",
  ".prettierrc.json",
  "DEVELOPERS.md",
  "README.md",
  "app",
  "drizzle",
  "drizzle.config.ts",
  "eslint.config.js",
  "nodesets",
  "package-lock.json",
  "package.json",
  "public",
  "react-router.config.ts",
  "tests",
  "tsconfig.json",
  "vite.config.ts",
  "vite.node.config.ts",
];

export function findLayer(path: string): LayerRule | undefined {
  return layerRules.find((rule) => rule.files.test(path));
}
