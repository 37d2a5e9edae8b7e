import type { NodeClass } from "~/domain/address-space/node";

/** A Property is a Variable that hangs on HasProperty; its glyph carries that line's two strokes. */
export type GlyphKind = NodeClass | "Property";

const shade = { stroke: "var(--shade)", strokeWidth: 2.2, fill: "none" } as const;
const leaf = { fill: "var(--leaf)" } as const;

const names: Record<GlyphKind, string> = {
  Object: "Object",
  Variable: "Variable",
  Property: "Property",
  Method: "Method",
  View: "View",
  ObjectType: "ObjectType",
  VariableType: "VariableType",
  DataType: "DataType",
  ReferenceType: "ReferenceType",
};

/** Shapes of OPC 10000-3 Annex C, Table C.1: types cast a hard shadow, Variables are rounded. */
function Shape({ kind }: { kind: GlyphKind }) {
  switch (kind) {
    case "Object":
      return <rect x="2" y="2.5" width="15" height="9" />;
    case "Variable":
      return <rect x="2" y="2.5" width="15" height="9" rx="4.2" />;
    case "Property":
      return (
        <>
          <path d="M0 7h6M1.9 4.4v5.2M4.1 4.4v5.2" />
          <rect x="6" y="2.5" width="12.5" height="9" rx="4.2" />
        </>
      );
    case "Method":
      return <ellipse cx="9.5" cy="7" rx="8" ry="5" />;
    case "View":
      return <path d="M5 2.5h9.2l3.3 9H1.7z" />;
    case "ObjectType":
      return (
        <>
          <path d="M4 13h15.2V4.6" {...shade} />
          <rect x="1.6" y="1.6" width="15.6" height="9.4" style={leaf} />
        </>
      );
    case "VariableType":
      return (
        <>
          <path d="M5.4 13h9.4a4.3 4.3 0 0 0 4.3-4.3V6" {...shade} />
          <rect x="1.6" y="1.6" width="15.6" height="9.4" rx="4.4" style={leaf} />
        </>
      );
    case "DataType":
      return (
        <>
          <path d="M6 13h9.6l3.6-4.4" {...shade} />
          <path d="M1.2 6.3 4.8 1.6h9.6L18 6.3 14.4 11H4.8z" style={leaf} />
        </>
      );
    case "ReferenceType":
      return (
        <>
          <path d="M5.6 13h13.2" {...shade} />
          <path d="M1.2 6.3 4.8 1.6h13L15 6.3l2.8 4.7h-13z" style={leaf} />
        </>
      );
  }
}

type Props = {
  kind: GlyphKind;
  width?: number;
  className?: string;
  /** Read out; leave it away where the class is said in words. */ label?: boolean;
};

export function NodeClassGlyph({ kind, width = 20, className, label }: Props) {
  return (
    <svg
      viewBox="0 0 20 14"
      width={width}
      height={(width * 14) / 20}
      className={className ?? "shrink-0"}
      fill="none"
      stroke="currentColor"
      strokeWidth={1.25}
      strokeLinejoin="round"
      {...(label ? { role: "img", "aria-label": names[kind] } : { "aria-hidden": true })}
    >
      <Shape kind={kind} />
    </svg>
  );
}
