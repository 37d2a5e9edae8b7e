import { Button } from "./button";

type ProgressProps = {
  /** What is being done now. */
  stage: string;
  /** 0 … 1; absent when it is not known how long it takes. */
  done?: number | undefined;
  /** The figure beside the stage, as `3 of 6`. */
  figure?: string | undefined;
  onCancel?: (() => void) | undefined;
  className?: string;
};

/** Long work: a thin ink bar with stage, figure and a way out. */
export function Progress({ stage, done, figure, onCancel, className }: ProgressProps) {
  const percent = done === undefined ? undefined : Math.round(Math.min(1, Math.max(0, done)) * 100);
  return (
    <div className={className}>
      <div className="mb-1.5 flex min-h-6 items-center gap-3 text-small">
        <span aria-live="polite">{stage}</span>
        <span className="ml-auto font-mono text-ink-2">{figure ?? (percent === undefined ? "" : `${percent} %`)}</span>
        {onCancel ? (
          <Button size="small" onClick={onCancel}>
            Cancel
          </Button>
        ) : null}
      </div>
      <div
        role="progressbar"
        aria-label={stage}
        aria-valuemin={0}
        aria-valuemax={100}
        {...(percent === undefined ? {} : { "aria-valuenow": percent })}
        className="h-[5px] overflow-hidden border border-ink-2"
      >
        <div
          className={
            percent === undefined ? "h-full w-full hatch" : "h-full bg-ink-2 transition-[width] duration-(--calm)"
          }
          {...(percent === undefined ? {} : { style: { width: `${percent}%` } })}
        />
      </div>
    </div>
  );
}
