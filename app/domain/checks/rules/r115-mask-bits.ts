import type { Node } from "../../address-space/node";
import { keepBits, listSurplusBits } from "../bit-rules";
import { findSubject, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import type { Operation } from "../../editing/operation";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

const PERMISSIONS = 0xffff;
const RESTRICTIONS = 0b1111;
const WRITE_MASK = 0x3ffffff;
/** ValueForVariableType has no meaning on a Variable. */
const WRITE_MASK_VARIABLE = WRITE_MASK & ~(1 << 21);

export const r115: NodeRule = {
  id: "R115",
  title: "Bits of WriteMask, permissions and restrictions",
  severity: "error",
  clause: clause(3, "§8.55, §8.56, §8.60"),
  priority: 2,
  concerns: ALL_CLASSES,
  attributes: ["writeMask", "accessRestrictions", "rolePermissions"],
  condition:
    "Permissions use bits 0 to 15, AccessRestrictions 0 to 3, WriteMask 0 to 25 (without bit 21 on Variables).",
  why: "A reserved bit in a permission may become a right that nobody wanted to give.",
  check(node, _ctx, report) {
    for (const { attribute, mask, allowed } of listMasks(node)) {
      const surplus = listSurplusBits(mask, allowed);
      if (surplus === undefined) continue;
      report({
        attribute,
        message: `${attribute.charAt(0).toUpperCase()}${attribute.slice(1)} of ${node.browseName.name} has reserved bits.`,
        facts: [`Value: ${mask}`, `Reserved and set: ${surplus}`],
      });
    }
  },
  fix: {
    label: "Clear the reserved bits",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const operations = node ? listMends(node) : [];
      return operations.length > 0 ? ok(operations) : notPossible(finding);
    },
  },
  examples: {
    good: { text: "Sign and encrypt.", build: (m) => m.object("Pump1", { set: { accessRestrictions: 3 } }) },
    bad: { text: "Bit 4 of AccessRestrictions.", build: (m) => m.object("Pump1", { set: { accessRestrictions: 19 } }) },
  },
};

type Mask = {
  readonly attribute: "writeMask" | "accessRestrictions" | "rolePermissions";
  readonly mask: number;
  readonly allowed: number;
};

function listMasks(node: Node): Mask[] {
  const masks: Mask[] = (node.rolePermissions ?? []).map((p) => ({
    attribute: "rolePermissions",
    mask: p.permissions,
    allowed: PERMISSIONS,
  }));
  if (node.accessRestrictions !== undefined)
    masks.push({ attribute: "accessRestrictions", mask: node.accessRestrictions, allowed: RESTRICTIONS });
  const allowed = node.nodeClass === "Variable" ? WRITE_MASK_VARIABLE : WRITE_MASK;
  if (node.writeMask !== undefined) masks.push({ attribute: "writeMask", mask: node.writeMask, allowed });
  return masks;
}

function listMends(node: Node): Operation[] {
  const broken = listMasks(node).filter((m) => listSurplusBits(m.mask, m.allowed) !== undefined);
  return [...new Set(broken.map((m) => m.attribute))].map((attribute) => {
    if (attribute === "rolePermissions") {
      const mended = (node.rolePermissions ?? []).map((p) => ({
        ...p,
        permissions: keepBits(p.permissions, PERMISSIONS),
      }));
      return setAttribute(node.key, attribute, mended);
    }
    const mask = broken.find((m) => m.attribute === attribute);
    return setAttribute(node.key, attribute, keepBits(mask?.mask ?? 0, mask?.allowed ?? 0));
  });
}
