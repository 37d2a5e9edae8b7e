import { modelsFix } from "../header-fixes";
import { toInstant } from "../model-versions";
import { clause, type ModelRule } from "../rule";

export const r175: ModelRule = {
  id: "R175",
  title: "PublicationDate with time zone",
  severity: "error",
  clause: clause(6, "§F.2, §5.3.1.6"),
  priority: 1,
  concerns: "model",
  condition:
    "PublicationDate is a date and time with Z or an offset. Another zone than UTC is a hint, a missing date a warning.",
  why: "Read in two time zones the same file has two ages, and a server refuses the one that it has.",
  check(ctx, report) {
    for (const { modelUri, publicationDate } of ctx.header.models) {
      const facts = [`PublicationDate: ${publicationDate ?? "none"}`];
      const data = { modelUri };
      if (publicationDate === undefined || publicationDate === "")
        report({
          severity: "warning",
          attribute: "models",
          message: `The model ${modelUri} has no PublicationDate.`,
          facts,
          data,
        });
      else if (toInstant(publicationDate) === undefined)
        report({
          attribute: "models",
          message: `The PublicationDate “${publicationDate}” of ${modelUri} is no date.`,
          facts,
          data,
        });
      else if (!/(?:Z|[+-]\d\d:\d\d)$/.test(publicationDate))
        report({ attribute: "models", message: `The PublicationDate of ${modelUri} has no time zone.`, facts, data });
      else if (!/(?:Z|[+-]00:00)$/.test(publicationDate))
        report({
          severity: "hint",
          attribute: "models",
          message: `The PublicationDate of ${modelUri} is not in UTC.`,
          facts,
          data,
        });
    }
  },
  fix: modelsFix("Write the date in UTC", (model) => {
    const instant = toInstant(model.publicationDate);
    return instant === undefined
      ? model
      : { ...model, publicationDate: new Date(instant).toISOString().replace(".000Z", "Z") };
  }),
  examples: {
    good: { text: "With Z.", build: () => undefined },
    bad: {
      text: "Without zone.",
      build: (m) => {
        m.setModel({ publicationDate: "2026-05-01T00:00:00" });
        return "model";
      },
    },
  },
};
