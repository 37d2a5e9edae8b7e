export const checksProblemTexts: Readonly<Record<string, string>> = {
  "fix.not-possible":
    "The finding of {rule} cannot be mended like this any more: the model has changed, or the case is not clear enough.",
  "check-file.unreadable": "{file} cannot be read: {detail}",
};
