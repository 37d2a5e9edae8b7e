import { getInputProps, type FieldMetadata } from "@conform-to/react";
import type { HTMLAttributes, ReactNode } from "react";
import { Field, Input, type ControlSize } from "~/components/ui/field";

type ConformFieldProps = {
  field: FieldMetadata<string | undefined>;
  label: string;
  type?: "text" | "email" | "password" | "url" | "date";
  hint?: ReactNode;
  size?: ControlSize;
  mono?: boolean;
  autoComplete?: string;
  autoFocus?: boolean;
  placeholder?: string;
  optional?: boolean;
  inputMode?: HTMLAttributes<HTMLInputElement>["inputMode"];
};

/** A text field of a checked form. */
export function ConformField({ field, label, type = "text", hint, optional, ...control }: ConformFieldProps) {
  const { key, ...input } = getInputProps(field, { type, ariaAttributes: false });
  return (
    <Field label={label} hint={hint} errors={field.errors} {...(optional ? { optional } : {})}>
      {(tied) => <Input key={key} {...input} {...control} {...tied} />}
    </Field>
  );
}
