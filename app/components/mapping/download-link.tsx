import { Download } from "lucide-react";
import { buttonClass } from "~/components/ui/button";
import { Icon } from "~/components/ui/icon";

export function DownloadLink({ href, name, isLocked }: { href: string; name: string; isLocked: boolean }) {
  if (isLocked) return <span className="text-note text-ink-3">review the outputs first</span>;
  return (
    <a href={href} download aria-label={`Download ${name}`} className={buttonClass("plain", "small")}>
      <Icon of={Download} /> Download
    </a>
  );
}
