import { Check, Copy } from "lucide-react";
import { useState } from "react";
import { IconButton } from "../ui/button";

/** An identifier to take away: shown whole, copied with one press. */
export function CopyField({ label, value }: { label: string; value: string }) {
  const [isCopied, setCopied] = useState(false);
  return (
    <span className="inline-flex min-w-0 items-center gap-1">
      <span className="min-w-0 font-mono break-all select-all">{value}</span>
      <IconButton
        icon={isCopied ? Check : Copy}
        label={isCopied ? "Copied" : `Copy ${label}`}
        size="small"
        onClick={() => {
          void navigator.clipboard.writeText(value).then(() => {
            setCopied(true);
            setTimeout(() => setCopied(false), 1500);
          });
        }}
      />
    </span>
  );
}
