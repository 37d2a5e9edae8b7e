import type { ReactNode } from "react";
import { FindingShape } from "~/components/notation/finding-badge";
import { LinkButton } from "~/components/ui/button";
import type { Severity } from "~/domain/core/result";
import type { ParkData } from "./park-data";

type Waiting = { id: string; severity: Severity; title: string; about: ReactNode; to: string; action: string };

/** What asks for somebody's hand, the most urgent first. */
function listWaiting({ models, machines, reviews, gateways, testServers }: ParkData): Waiting[] {
  const ofModels = models.flatMap((model): Waiting[] => {
    const { error, warning } = model.tally;
    const rows: Waiting[] = [];
    if (model.missing.length > 0)
      rows.push({
        id: `missing ${model.id}`,
        severity: "error",
        title: `${model.name} lacks a required model`,
        about: model.missing.join(" "),
        to: "/models/import?into=library",
        action: "Add it",
      });
    if (error > 0)
      rows.push({
        id: `error ${model.id}`,
        severity: "error",
        title: `${model.name} has ${error} ${error === 1 ? "error" : "errors"}`,
        about: "Other OPC UA software may refuse the export.",
        to: `/models/${model.id}/findings`,
        action: "Look at it",
      });
    else if (warning > 0)
      rows.push({
        id: `warning ${model.id}`,
        severity: "warning",
        title: `${model.name} has ${warning} ${warning === 1 ? "warning" : "warnings"}`,
        about: "It can be exported; readers may stumble.",
        to: `/models/${model.id}/findings`,
        action: "Look at it",
      });
    return rows;
  });
  const ofServers = testServers
    .filter((server) => server.state === "failed" || server.state === "lost")
    .map((server): Waiting => ({
      id: server.id,
      severity: "error",
      title: `The test server of ${server.modelName} ended`,
      about: server.state === "lost" ? "Its process is gone." : "It failed; its log has the last lines.",
      to: `/models/${server.modelId}/test-server`,
      action: "Look at it",
    }));
  const ofReviews = reviews
    .filter((review) => review.waitsForMe)
    .map((review): Waiting => ({
      id: `review ${review.id}`,
      severity: "warning",
      title: `${review.author} asks you about ${review.model}`,
      about: `Review ${review.number}: ${review.title}`,
      to: `/reviews/${review.id}`,
      action: "Decide",
    }));
  const ofGateways = gateways
    .filter(({ delivered, proved }) => !delivered.isWithdrawn && delivered.version !== proved?.version)
    .map(({ gatewayId, gateway, model, delivered }): Waiting => ({
      id: `gateway ${gatewayId} ${model}`,
      severity: "hint",
      title: `${gateway} owes the proof of ${delivered.version}`,
      about: `Release ${delivered.version} of ${model} was ${delivered.state}; no as-built report proves it yet.`,
      to: `/releases/${delivered.releaseId}`,
      action: "Look at it",
    }));
  const weight: Record<Severity, number> = { error: 0, warning: 1, hint: 2 };
  return [...ofServers, ...ofModels, ...ofReviews, ...listLate(machines), ...ofGateways].sort((a, b) => weight[a.severity] - weight[b.severity]);
}

/** Machines whose types have a newer frozen revision, one entry a model. */
function listLate(machines: ParkData["machines"]): Waiting[] {
  const late = machines.filter(({ facts }) => facts.typeVersion && facts.typeVersion.number < facts.typeVersion.newest);
  return [...new Set(late.map((machine) => machine.modelId))].map((modelId): Waiting => {
    const own = late.filter((machine) => machine.modelId === modelId);
    const newest = own[0]?.facts.typeVersion?.newest ?? 0;
    const names = own.map((machine) => machine.name);
    return {
      id: `late ${modelId}`,
      severity: "hint",
      title: names.length === 1 ? `${names[0]} follows an earlier type version` : `${names.length} machines follow an earlier type version`,
      about: `${names.slice(0, 8).join(", ")}: revision ${newest} of their type is frozen.`,
      to: `/models/${modelId}/roll-out?take=${newest}`,
      action: "See what it brings",
    };
  });
}

export function WaitList({ park }: { park: ParkData }) {
  const waiting = listWaiting(park);
  return (
    <section className="border-t-[1.5px] border-ink pt-2">
      <h2 className="text-lead font-semibold tracking-[-0.01em]">
        Waits for you <span className="font-mono font-normal text-ink-3">{waiting.length}</span>
      </h2>
      {waiting.length === 0 ? (
        <p className="mt-2 border-t border-hair pt-2 text-small text-ink-2">
          Nothing. No model has an error or a warning, and no test server has failed.
        </p>
      ) : (
        <ul className="mt-2">
          {waiting.map((row) => (
            <li key={row.id} className="grid grid-cols-[18px_minmax(0,1fr)] gap-1.5 border-t border-hair py-2.5">
              <span className="pt-0.5">
                <FindingShape severity={row.severity} />
              </span>
              <span>
                <b className="block font-semibold">{row.title}</b>
                <span className="block text-small text-ink-2">{row.about}</span>
                <span className="mt-1.5 flex justify-end">
                  <LinkButton to={row.to} size="small">
                    {row.action}
                  </LinkButton>
                </span>
              </span>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}
