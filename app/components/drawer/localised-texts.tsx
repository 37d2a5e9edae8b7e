import { Plus } from "lucide-react";
import { useState } from "react";
import type { LocalizedText } from "~/domain/address-space/qualified-name";
import { Button } from "../ui/button";
import { CommitField } from "./particular";

type Props = {
  id: string;
  label: string;
  texts: readonly LocalizedText[];
  readOnly: boolean;
  rows?: number;
  /** Empty text takes the language away. */
  onChange: (text: string, locale: string | undefined) => void;
};

/** One text in each language. The first stands without a locale in many files; it stays as it was written. */
export function LocalisedTexts({ id, label, texts, readOnly, rows, onChange }: Props) {
  const [added, setAdded] = useState<string>();
  const shown: readonly LocalizedText[] = texts.length > 0 ? texts : [{ text: "" }];

  return (
    <>
      {shown.map((text, index) => (
        <div key={`${index}-${text.locale ?? ""}`} className="localised">
          <CommitField
            {...(index === 0 ? { id } : { label: `${label} in ${text.locale ?? "no language"}` })}
            className="pr-9!"
            value={text.text}
            readOnly={readOnly}
            {...(rows === undefined ? {} : { rows })}
            onCommit={(next) => onChange(next, text.locale)}
          />
          <span className="locale">{text.locale ?? ""}</span>
        </div>
      ))}
      {added === undefined ? null : (
        <div className="localised">
          <CommitField
            label={`${label} in ${added}`}
            className="pr-9!"
            value=""
            readOnly={readOnly}
            {...(rows === undefined ? {} : { rows })}
            onCommit={(text) => {
              setAdded(undefined);
              if (text !== "") onChange(text, added);
            }}
          />
          <span className="locale">{added}</span>
        </div>
      )}
      {readOnly || added !== undefined ? null : <AddLanguage label={label} taken={texts} onAdd={setAdded} />}
    </>
  );
}

const OFFERED = ["en", "de", "fr", "es", "it", "pl", "cs", "nl", "sv", "pt", "zh", "ja"];

function AddLanguage({
  label,
  taken,
  onAdd,
}: {
  label: string;
  taken: readonly LocalizedText[];
  onAdd: (locale: string) => void;
}) {
  const [isOpen, setOpen] = useState(false);
  const free = OFFERED.filter((locale) => !taken.some((text) => text.locale === locale));
  if (!isOpen) {
    return (
      <Button size="small" tone="bare" icon={Plus} className="-ml-1.5" onClick={() => setOpen(true)}>
        Language
      </Button>
    );
  }
  return (
    <span className="flex flex-wrap gap-1" role="group" aria-label={`Language to add to ${label}`}>
      {free.map((locale) => (
        <Button
          key={locale}
          size="small"
          className="px-1.5! font-mono"
          onClick={() => {
            setOpen(false);
            onAdd(locale);
          }}
        >
          {locale}
        </Button>
      ))}
    </span>
  );
}
