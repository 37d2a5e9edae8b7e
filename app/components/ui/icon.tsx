import type { LucideIcon } from "lucide-react";

type IconProps = { of: LucideIcon; size?: number; className?: string; label?: string };

/** A line icon in the weight of the drawing; decorative unless it has a label. */
export function Icon({ of: Shape, size = 14, className, label }: IconProps) {
  return (
    <Shape
      size={size}
      strokeWidth={size > 16 ? 1.5 : 1.75}
      absoluteStrokeWidth={false}
      className={className ?? "shrink-0"}
      {...(label ? { role: "img", "aria-label": label } : { "aria-hidden": true })}
    />
  );
}
