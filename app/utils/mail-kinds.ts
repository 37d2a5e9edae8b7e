/** Kinds of mail; each can be refused by itself. */
export const mailKinds = {
  "review-asked": "somebody asks you for a review",
  "review-comment": "somebody comments in a review that you take part in",
  "review-decided": "somebody approves, asks for changes, or an approval becomes void",
  "as-built": "the verdict of a scheduled as-built report changes",
  release: "a version is released or withdrawn",
} as const;
export type MailKind = keyof typeof mailKinds;

export function isMailKind(text: string): text is MailKind {
  return text in mailKinds;
}
