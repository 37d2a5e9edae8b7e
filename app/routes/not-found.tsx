import { failWith } from "~/utils/problem-response.server";

/** Every address that no page answers. */
export function loader() {
  throw failWith(404, "request.not-found");
}

export const action = loader;

export default function NotFound() {
  return null;
}
