import { handleApi } from "~/utils/api-handler.server";
import { failWith } from "~/utils/problem-response.server";

/** Whatever the API does not have. */
export const loader = handleApi(() => {
  throw failWith(404, "request.not-found");
});

export const action = loader;
