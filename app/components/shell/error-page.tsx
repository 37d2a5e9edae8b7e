import { isRouteErrorResponse, Link, useLocation } from "react-router";
import { buttonClass } from "~/components/ui/button";

type ErrorWords = { status: string; title: string; text: string; isOurFault?: boolean };

const byStatus: Readonly<Record<number, ErrorWords>> = {
  400: { status: "400", title: "This address cannot be understood", text: "A part of it is missing or wrong." },
  401: { status: "401", title: "You are not signed in", text: "Sign in to go on; you come back to this page." },
  403: {
    status: "403",
    title: "Your roles do not allow this",
    text: "An administrator of your organisation can give you the role on the Team page.",
  },
  404: {
    status: "404",
    title: "Nothing is here",
    text: "It was removed, belongs to another organisation, or the address has a slip in it.",
  },
  413: { status: "413", title: "Too large", text: "Files are read up to 50 MB." },
  429: { status: "429", title: "Too many requests", text: "Wait a minute, then try again." },
};

const unknown: ErrorWords = {
  status: "500",
  title: "Something broke on our side",
  text: "Nothing that was saved is lost. The server's log says what happened. Load the page again; if it breaks again, tell the administrator what you did.",
  isOurFault: true,
};

function toWords(error: unknown): ErrorWords {
  if (error instanceof Response) return byStatus[error.status] ?? unknown;
  if (!isRouteErrorResponse(error)) return unknown;
  const known = byStatus[error.status] ?? { ...unknown, status: String(error.status) };
  const detail = readDetail(error.data);
  return detail && error.status < 500 ? { ...known, text: detail } : known;
}

/** The sentence of a problem document, when the error carries one. */
function readDetail(data: unknown): string | undefined {
  const parsed: unknown = typeof data === "string" && data.startsWith("{") ? parseJson(data) : data;
  if (typeof parsed !== "object" || parsed === null || !("detail" in parsed)) return undefined;
  return typeof parsed.detail === "string" ? parsed.detail : undefined;
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}

/** A broken wire, what happened, and where to go from here. Never a stack. */
export function ErrorPage({ error }: { error: unknown }) {
  const words = toWords(error);
  const { pathname, search } = useLocation();
  return (
    <main id="main" className="grid min-h-0 flex-1 place-content-center overflow-auto p-6">
      <div className="w-130 max-w-full">
        <BrokenWire label={words.status} />
        <h1 className="mt-6 text-title font-semibold tracking-[-0.02em]">{words.title}</h1>
        <p className="mt-1 text-body text-ink-2">{words.text}</p>
        <p className="mt-4 flex flex-wrap gap-2">
          {words.status === "401" ? (
            <Link to={`/sign-in?to=${encodeURIComponent(pathname + search)}`} className={buttonClass("main")}>
              Sign in
            </Link>
          ) : null}
          {words.isOurFault ? (
            <a href={pathname + search} className={buttonClass("main")}>
              Load again
            </a>
          ) : null}
          <Link to="/" className={buttonClass()}>
            Go to the park
          </Link>
        </p>
      </div>
    </main>
  );
}

function BrokenWire({ label }: { label: string }) {
  return (
    <svg viewBox="0 0 520 64" className="w-full" fill="none" stroke="var(--ink)" strokeWidth={1.5} aria-hidden>
      <path d="M0 32h196" />
      <path d="M196 20 214 28h40v8h-40l-18 8z" strokeLinejoin="round" />
      <path d="M254 32h16m6-8 6 16m4-12 6 12" stroke="var(--edge)" />
      <path d="M306 32h214" strokeDasharray="6 5" stroke="var(--edge)" />
      <rect x="404" y="18" width="76" height="28" rx="9" fill="var(--leaf)" />
      <text
        x="442"
        y="37"
        textAnchor="middle"
        fill="var(--ink)"
        stroke="none"
        fontFamily="var(--mono)"
        fontSize="14"
        fontWeight="600"
      >
        {label}
      </text>
    </svg>
  );
}
