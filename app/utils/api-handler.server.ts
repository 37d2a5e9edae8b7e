/** What every API route shares: thrown answers are answers, and what goes wrong unexpectedly is a problem document too. */
import { logError } from "./log.server";
import { failWith } from "./problem-response.server";

type HandlerArgs = { readonly request: Request };

export function handleApi<Args extends HandlerArgs>(work: (args: Args) => Response | Promise<Response>): (args: Args) => Promise<Response> {
  return async (args) => {
    try {
      return await work(args);
    } catch (thrown) {
      if (thrown instanceof Response) return thrown;
      const id = logError(thrown, `${args.request.method} ${new URL(args.request.url).pathname}`);
      return failWith(500, "request.internal", { id });
    }
  };
}

/** For routes that only read: every other method is answered 405. */
export const refuseChanges = handleApi(({ request }: HandlerArgs) => {
  throw failWith(405, "request.method", { method: request.method }, { allow: "GET" });
});
