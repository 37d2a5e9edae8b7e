/** The screens of the top bar, in order. */
export const screens = [
  { to: "/", label: "Park", end: true },
  { to: "/models", label: "Models", end: false },
  { to: "/devices", label: "Devices", end: false },
  { to: "/sources", label: "Sources", end: false },
  { to: "/library", label: "Library", end: false },
  { to: "/reviews", label: "Reviews", end: false },
  { to: "/live", label: "Live", end: false },
  { to: "/team", label: "Team", end: false },
] as const;
