import { headerFix } from "../header-fixes";
import { clause, type ModelRule } from "../rule";
import { standardKey } from "../../address-space/node-id";

export const r188: ModelRule = {
  id: "R188",
  title: "Aliases resolve and are unique",
  severity: "error",
  clause: clause(6, "§F.2"),
  priority: 1,
  concerns: "model",
  condition:
    "Names of aliases are unique, and each stands for a node of a loaded model. Aliases that are used and not defined are found while the file is read.",
  why: "The attribute or reference that uses the alias means another node, or none.",
  check(ctx, report) {
    const aliases = ctx.header.aliases ?? [];
    const seen = new Map<string, string>();
    for (const [name, key] of aliases) {
      const other = seen.get(name);
      if (other !== undefined && other !== key)
        report({
          attribute: "aliases",
          message: `The alias ${name} is defined twice.`,
          facts: [`Once as ${other}`, `Once as ${key}`],
          data: { alias: name },
        });
      seen.set(name, key);
      const namespace = ctx.namespaceOf(key);
      if (ctx.node(key) || (namespace !== undefined && !ctx.isNamespaceLoaded(namespace))) continue;
      report({
        attribute: "aliases",
        message: `The alias ${name} stands for ${key}, which does not exist.`,
        facts: [`Alias: ${name} = ${key}`],
        data: { alias: name },
      });
    }
  },
  fix: headerFix("Remove the alias", "aliases", (header, { data }) =>
    header.aliases?.some(([name]) => name === data?.["alias"])
      ? header.aliases.filter(([name]) => name !== data?.["alias"])
      : undefined,
  ),
  examples: {
    good: {
      text: "The usual name of a reference type.",
      build: (m) => {
        m.setHeader({ aliases: [["HasComponent", standardKey(47)]] });
        return undefined;
      },
    },
    bad: {
      text: "One for a node that does not exist.",
      build: (m) => {
        m.setHeader({ aliases: [["HasParts", standardKey(4294967290)]] });
        return "model";
      },
    },
  },
};
