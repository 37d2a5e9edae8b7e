import { standardKey } from "../../address-space/node-id";
import { attributeFix } from "../fixes";
import { findTypeDefinition, isChainLoaded, isKindOf } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r197: NodeRule = {
  id: "R197",
  title: "RolePermissions name roles",
  severity: "warning",
  clause: `${clause(6, "§F.3, §F.5")}, ${clause(3, "§5.2.9, §4.9.2")}; that the role exists: common practice, no source`,
  priority: 2,
  concerns: ALL_CLASSES,
  attributes: ["rolePermissions"],
  condition: "Each permission names an Object of RoleType; the well-known roles stand in namespace 0.",
  why: "A permission of an unknown role is given to nobody.",
  check(node, ctx, report) {
    for (const { role } of node.rolePermissions ?? []) {
      const namespace = ctx.namespaceOf(role);
      const found = ctx.node(role);
      const type = found && findTypeDefinition(ctx, role);
      const isKnown = found
        ? type !== undefined && (isKindOf(ctx, type, N.RoleType) || !isChainLoaded(ctx, type))
        : namespace !== undefined && !ctx.isNamespaceLoaded(namespace);
      if (isKnown) continue;
      report({
        attribute: "rolePermissions",
        message: `${node.browseName.name} gives permissions to ${found ? found.browseName.name : role}, which is no role.`,
        facts: [`Role: ${ctx.describe(role)}`, `Its type: ${type === undefined ? "none" : ctx.describe(type)}`],
        data: { role },
      });
    }
  },
  fix: attributeFix("Remove the permission", "rolePermissions", (node, finding) =>
    node.rolePermissions?.some((p) => p.role === finding.data?.["role"])
      ? node.rolePermissions.filter((p) => p.role !== finding.data?.["role"])
      : undefined,
  ),
  examples: {
    good: {
      text: "Operator (i=15680).",
      build: (m) => m.object("Pump1", { set: { rolePermissions: [{ role: standardKey(15680), permissions: 33 }] } }),
    },
    bad: {
      text: "An id that is no role.",
      build: (m) =>
        m.object("Pump1", { set: { rolePermissions: [{ role: standardKey(4294967290), permissions: 33 }] } }),
    },
  },
};
