/** The socket of a port as one looks at it: A-coded, five pins. A copper ring marks the one that is open below. */
export function PortSocket({ isHere, isWrong, isPlugged }: { isHere: boolean; isWrong: boolean; isPlugged: boolean }) {
  const stroke = isWrong ? "var(--error)" : isHere ? "var(--copper)" : "var(--ink)";
  return (
    <svg viewBox="0 0 44 56" width={44} height={56} fill="none" stroke={stroke} strokeWidth={1.5} aria-hidden>
      <circle cx="22" cy="22" r="19" fill="var(--leaf)" strokeWidth={isHere ? 2.5 : 1.5} />
      <circle cx="22" cy="22" r="14" />
      <path d="M19.5 8.4h5v3h-5z" fill={stroke} stroke="none" />
      {[
        [16, 16],
        [28, 16],
        [16, 28],
        [28, 28],
        [22, 22],
      ].map(([x, y]) => (
        <circle key={`${x} ${y}`} cx={x} cy={y} r="1.7" fill={stroke} stroke="none" />
      ))}
      <path
        d="M17 41h10v15H17z"
        fill={isPlugged ? stroke : "var(--leaf)"}
        {...(isPlugged ? {} : { strokeDasharray: "2.5 2" })}
      />
    </svg>
  );
}
