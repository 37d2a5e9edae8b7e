import type { ReactNode } from "react";
import { FerruleMark } from "~/components/notation/ferrule-badge";
import { LandingDrawing } from "./landing-drawing";

/** The page before the door: a drawing of what the product does, and a panel. Used for sign-in and set-up. */
export function Gate({
  title,
  about,
  foot,
  children,
}: {
  title: string;
  about?: ReactNode;
  foot?: ReactNode;
  children: ReactNode;
}) {
  return (
    <div className="grid min-h-dvh grid-cols-[minmax(0,1fr)_460px] bg-paper max-lg:grid-cols-1">
      <aside className="relative flex flex-col border-r-[1.5px] border-ink bg-bench p-10 max-lg:hidden">
        <p className="flex items-center gap-2.5 text-title font-bold tracking-[-0.02em]">
          <FerruleMark width={43} /> Ferrule
        </p>
        <div className="grid min-h-0 flex-1 place-items-center py-6">
          <LandingDrawing />
        </div>
        <p className="max-w-136 text-lead leading-6 text-ink-2">
          A ferrule gives a wire a clean end before it is landed in a terminal. This one does it for the signals of your
          machines, before they are landed in an OPC UA server.
        </p>
      </aside>
      <main id="main" className="flex flex-col px-10 py-10 max-sm:px-5 max-sm:py-6">
        <p className="mb-8 flex items-center gap-2 text-lead font-bold tracking-[-0.015em] lg:hidden">
          <FerruleMark /> Ferrule
        </p>
        <div className="my-auto grid w-full max-w-120 gap-5 self-center">
          <header>
            <h1 className="text-title font-semibold tracking-[-0.02em]">{title}</h1>
            {about ? <div className="mt-1 text-body text-ink-2">{about}</div> : null}
          </header>
          {children}
        </div>
        {foot ? <div className="mt-8 text-note text-ink-3">{foot}</div> : null}
      </main>
    </div>
  );
}
