/** A device as it hangs on its cable: its picture when the file brought one, else a drawn housing. */
export function DeviceSymbol({ picture, size = 48 }: { picture?: string | undefined; size?: number }) {
  if (picture !== undefined)
    return (
      <img
        src={picture}
        alt=""
        width={size}
        height={size}
        className="border border-hair bg-[#ffffff] object-contain"
        style={{ width: size, height: size }}
      />
    );
  return (
    <svg viewBox="0 0 48 48" width={size} height={size} fill="none" stroke="var(--ink)" strokeWidth={1.5} aria-hidden>
      <path d="M24 2v7" strokeWidth={2} />
      <path d="M18 9h12v6H18z" />
      <path d="M13 15h22v19H13z" fill="var(--leaf)" />
      <path d="M13 20h22M13 25h22M13 30h22" strokeWidth={0.9} stroke="var(--ink-3)" />
      <path d="M16 34h16v6H16z" />
    </svg>
  );
}
