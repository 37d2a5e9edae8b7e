import { X } from "lucide-react";
import { useState } from "react";
import { IconButton, LinkButton } from "~/components/ui/button";
import { FerruleBadge } from "~/components/notation/ferrule-badge";
import { cx } from "~/components/ui/cx";
import { hiddenStepsCookie } from "~/utils/hidden-steps";
import type { ParkData } from "./park-data";

type Step = { title: string; about: string; to: string | undefined; action: string; isDone: boolean };

function toSteps({ models, testServers }: ParkData): Step[] {
  const machines = models.find((model) => model.kind === "machines");
  const ofTypes = models.filter((model) => model.kind === "types");
  // The type that the machines are made of says more than any other.
  const types = ofTypes.find((model) => machines?.requires.includes(model.namespaceUri)) ?? ofTypes[0] ?? models[0];
  const served = machines ?? types;
  const running = testServers.find((server) => server.state === "running");
  return [
    {
      title: types ? `Open ${types.name}` : "Open a model",
      about: "The type on its sheet: groups, members, units, ranges.",
      to: types ? `/models/${types.id}/sheet` : undefined,
      action: "Open",
      isDone: false,
    },
    {
      title: "Start a test server",
      about: running
        ? `${running.modelName} is served at ${running.endpointUrl ?? "its endpoint"}.`
        : `Serves ${served?.name ?? "the model"} on this host, with simulated values.`,
      to: running ? "/live" : served ? `/models/${served.id}/test-server` : undefined,
      action: running ? "Look at it" : "Start",
      isDone: running !== undefined,
    },
    {
      title: "Watch values",
      about: running ? "Along the browse path, with unit, status and age." : "Once a test server runs.",
      to: running ? `/live/${running.id}` : undefined,
      action: "Watch",
      isDone: false,
    },
  ];
}

/** Three next steps on one wire; the one to take now is copper. */
export function FirstSteps({ park }: { park: ParkData }) {
  const [hidden, setHidden] = useState(false);
  const steps = toSteps(park);
  if (hidden) return null;
  const next = steps[1]?.isDone ? 2 : 0;
  return (
    <section aria-label="Next steps" className="relative mb-5 border border-rule bg-leaf">
      <ol className="grid grid-cols-3 max-md:grid-cols-1">
        {steps.map((step, i) => (
          <li
            key={step.title}
            className={cx(
              "flex items-start gap-3 border-l border-hair py-3 pr-4 pl-4 first:border-l-0 md:last:pr-10 max-md:first:pr-10 max-md:border-t max-md:border-l-0 max-md:first:border-t-0",
            )}
          >
            <span className="mt-0.5 flex items-center gap-1.5">
              <span className="font-mono text-small text-ink-3">{i + 1}</span>
              <FerruleBadge feed={step.isDone ? "fed" : "open"} title={step.isDone ? "done" : "to do"} />
            </span>
            <span className="min-w-0 flex-1">
              <b className="block font-semibold">{step.title}</b>
              <span className="block text-small break-words text-ink-2">{step.about}</span>
            </span>
            {step.to ? (
              <LinkButton to={step.to} tone={i === next ? "main" : "plain"} size="small">
                {step.action}
              </LinkButton>
            ) : null}
          </li>
        ))}
      </ol>
      <IconButton
        icon={X}
        size="small"
        label="Hide the next steps"
        className="absolute top-1.5 right-1.5"
        onClick={() => {
          document.cookie = hiddenStepsCookie;
          setHidden(true);
        }}
      />
    </section>
  );
}
