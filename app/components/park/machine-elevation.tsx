/** A machine in elevation: drive and drum on a base, its cabinet with the stack light beside it. Dashed when silent. */
export function MachineElevation({ silent }: { silent: boolean }) {
  return (
    <svg
      viewBox="0 0 124 84"
      width={124}
      height={84}
      className="mx-auto block h-auto max-[1400px]:w-[112px]"
      fill="var(--leaf)"
      stroke={silent ? "var(--ink-3)" : "var(--ink)"}
      strokeWidth={1.25}
      strokeLinejoin="round"
      {...(silent ? { strokeDasharray: "2.5 2" } : {})}
      aria-hidden
    >
      <path d="M4 80.500h116" fill="none" strokeWidth={1.5} />
      <path d="M12 72h60v8.500H12z" />
      <path d="M18 48h48v24H18z" />
      <path d="M24 54h14v12H24zM44 57h16M44 63h16" fill="none" />
      <circle cx="42" cy="30" r="18" />
      <circle cx="42" cy="30" r="12.500" fill="none" />
      <path
        d="M42 17.500v8M42 34.500v8M31.200 23.700l6.900 4M45.900 32.300l6.900 4M31.200 36.300l6.900-4M45.900 27.700l6.900-4"
        fill="none"
      />
      <circle cx="42" cy="30" r="3.500" />
      <path d="M60 30h14v-9h8" fill="none" strokeWidth={2} />
      <path d="M84 26h28v54.500H84zM98 26v54.500M101 50v8" />
      <path d="M98 26v-5" fill="none" />
      <path d="M93.500 4.500h9v5.500h-9zM93.500 10h9v5.500h-9zM93.500 15.500h9V21h-9z" />
      <path d="M72 76h12" fill="none" />
    </svg>
  );
}
