import { useMemo } from "react";
import { useFetcher, useNavigate, useSubmit } from "react-router";
import type { PaletteEntry } from "~/components/palette/palette-store";
import { usePaletteActions } from "~/components/palette/use-palette-actions";
import type { FrameData } from "~/presenters/frame.server";
import type { Theme } from "~/utils/theme";
import { screens } from "./screens";
import { themeFetcherKey } from "./theme-switch";

const themeWords: Record<Theme, string> = {
  light: "Light theme",
  dark: "Dark theme",
  system: "Theme as the system has it",
};

/** What the command palette offers on every page: screens, models, and what concerns the person. */
export function FrameActions({ frame }: { frame: FrameData }) {
  const navigate = useNavigate();
  const submit = useSubmit();
  const { submit: submitTheme } = useFetcher({ key: themeFetcherKey });
  const { models, permissions } = frame;
  const mayEdit = permissions.includes("model.edit");
  const entries = useMemo<PaletteEntry[]>(() => {
    const go = (path: string) => () => void navigate(path);
    return [
      ...screens.map(({ to, label }) => ({ id: `screen ${to}`, label, group: "Screens", run: go(to) })),
      { id: "screen /rules", label: "Rules of the checker", group: "Screens", run: go("/rules") },
      ...models.map(({ id, name, kind }) => ({
        id: `model ${id}`,
        label: name,
        group: "Models",
        hint: `model of ${kind}`,
        run: go(`/models/${id}/sheet`),
      })),
      ...(mayEdit
        ? [
            { id: "new-model", label: "New model", group: "Actions", run: go("/models/new") },
            { id: "import", label: "Import a NodeSet2 file", group: "Actions", run: go("/models/import") },
            {
              id: "library-add",
              label: "Add a NodeSet2 file to the library",
              group: "Actions",
              run: go("/models/import?into=library"),
            },
          ]
        : []),
      ...(Object.keys(themeWords) as Theme[]).map((theme) => ({
        id: `theme ${theme}`,
        label: themeWords[theme],
        group: "Actions",
        run: () => void submitTheme({ theme }, { method: "post", action: "/theme" }),
      })),
      {
        id: "sign-out",
        label: "Sign out",
        group: "Actions",
        run: () => void submit(null, { method: "post", action: "/sign-out" }),
      },
    ];
  }, [navigate, submit, submitTheme, models, mayEdit]);
  usePaletteActions(entries);
  return null;
}
