import { FileUp } from "lucide-react";
import { useRef, useState, type DragEvent } from "react";
import { Icon } from "~/components/ui/icon";
import { cx } from "~/components/ui/cx";

type Props = {
  name: string;
  accept: string;
  label: string;
  hint: string;
  onChosen: (file: File) => void;
  disabled?: boolean;
};

/** A place to drop a file on, which is also a plain file field. */
export function FileDrop({ name, accept, label, hint, onChosen, disabled }: Props) {
  const input = useRef<HTMLInputElement>(null);
  const [over, setOver] = useState(false);
  const [chosen, setChosen] = useState<string | undefined>(undefined);

  function take(files: FileList | null) {
    const file = files?.[0];
    if (!file) return;
    setChosen(file.name);
    onChosen(file);
  }
  function onDrop(event: DragEvent) {
    event.preventDefault();
    setOver(false);
    if (disabled || event.dataTransfer.files.length === 0 || !input.current) return;
    input.current.files = event.dataTransfer.files;
    take(event.dataTransfer.files);
  }
  return (
    <label
      onDragOver={(event) => (event.preventDefault(), setOver(true))}
      onDragLeave={() => setOver(false)}
      onDrop={onDrop}
      className={cx(
        "grid cursor-pointer place-content-center justify-items-center gap-2 border border-dashed p-10 text-center has-focus-visible:outline-2 has-focus-visible:outline-copper",
        over ? "border-copper bg-copper-wash" : "border-edge hover:bg-bench",
      )}
    >
      <Icon of={FileUp} size={28} className="text-ink-3" />
      <span className="text-body font-semibold">{chosen ?? label}</span>
      <span className="text-small text-ink-2">{hint}</span>
      <input
        ref={input}
        type="file"
        name={name}
        accept={accept}
        disabled={disabled}
        required
        className="sr-only"
        onChange={(event) => take(event.currentTarget.files)}
      />
    </label>
  );
}
