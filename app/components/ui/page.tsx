import type { ReactNode } from "react";
import { cx } from "./cx";

type PageProps = {
  title: ReactNode;
  about?: ReactNode;
  actions?: ReactNode;
  foot?: ReactNode;
  wide?: boolean;
  children: ReactNode;
};

/** A page below the top bar: title row, scrolling body, and a foot that stays. */
export function Page({ title, about, actions, foot, wide = true, children }: PageProps) {
  return (
    <>
      <main id="main" tabIndex={-1} className="min-h-0 flex-1 overflow-y-auto px-5 outline-none max-sm:px-4">
        <div className={cx("pb-8", !wide && "max-w-240")}>
          <header className="flex min-h-14 flex-wrap items-center gap-x-3 gap-y-2 py-2">
            <h1 className="text-title font-semibold tracking-[-0.02em]">{title}</h1>
            {about ? <div className="text-body text-ink-2">{about}</div> : null}
            {actions ? <div className="ml-auto flex flex-wrap items-center gap-2">{actions}</div> : null}
          </header>
          {children}
        </div>
      </main>
      {foot}
    </>
  );
}

/** A block of a page with its title; a rule or an ink line opens it. */
export function Block({
  title,
  about,
  actions,
  children,
  className,
}: {
  title: ReactNode;
  about?: ReactNode;
  actions?: ReactNode;
  children: ReactNode;
  className?: string;
}) {
  return (
    <section className={className}>
      <header className="mb-1.5 flex min-h-7 items-center gap-2">
        <h2 className="text-lead font-semibold tracking-[-0.01em]">{title}</h2>
        {about ? <div className="text-small text-ink-2">{about}</div> : null}
        {actions ? <div className="ml-auto flex items-center gap-2">{actions}</div> : null}
      </header>
      {children}
    </section>
  );
}
