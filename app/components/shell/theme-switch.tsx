import { useFetcher, useFetchers } from "react-router";
import { Segments } from "~/components/ui/segments";
import { isTheme, type Theme } from "~/utils/theme";

/** One fetcher for all places that choose a theme, so that each sees the choice at once. */
export const themeFetcherKey = "theme";

/** The theme that was just chosen, before the server has answered. */
export function usePendingTheme(): Theme | undefined {
  const chosen = useFetchers()
    .find((fetcher) => fetcher.key === themeFetcherKey)
    ?.formData?.get("theme");
  return isTheme(chosen) ? chosen : undefined;
}

export function ThemeSwitch({ theme }: { theme: Theme }) {
  const fetcher = useFetcher({ key: themeFetcherKey });
  const pending = usePendingTheme();
  return (
    <Segments
      label="Theme"
      value={pending ?? theme}
      onChange={(next) => void fetcher.submit({ theme: next }, { method: "post", action: "/theme" })}
      options={[
        { value: "light", label: "Light" },
        { value: "dark", label: "Dark" },
        { value: "system", label: "System" },
      ]}
    />
  );
}
