import type { LucideIcon } from "lucide-react";
import type { ButtonHTMLAttributes, ReactNode, Ref } from "react";
import { Link, type LinkProps } from "react-router";
import { cx } from "./cx";
import { Icon } from "./icon";
import { Tooltip } from "./tooltip";

/** `main` is the one filled action of a page; `ink` a chosen or second strong one; `bare` has no frame; `danger` removes something. */
export type ButtonTone = "plain" | "main" | "ink" | "bare" | "danger";
export type ButtonSize = "medium" | "small" | "large";

const tones: Record<ButtonTone, string> = {
  plain: "border-edge bg-leaf text-ink hover:bg-bench-2 active:bg-bench-2",
  main: "border-copper bg-copper text-ink-on hover:brightness-110 active:brightness-95",
  ink: "border-ink bg-ink text-ink-on hover:opacity-90",
  bare: "border-transparent bg-transparent text-ink-2 hover:bg-bench-2 hover:text-ink",
  danger: "border-error bg-leaf text-error hover:bg-error-wash",
};

const sizes: Record<ButtonSize, string> = {
  small: "h-6 px-2 gap-1.5 text-small",
  medium: "h-7 px-2.5 gap-1.5 text-small",
  large: "h-9 px-4 gap-2 text-body",
};

export function buttonClass(tone: ButtonTone = "plain", size: ButtonSize = "medium", className?: string): string {
  return cx(
    "inline-flex shrink-0 items-center justify-center rounded-edge border font-medium whitespace-nowrap select-none",
    "transition-[background-color,filter,opacity,color]",
    "disabled:border-dashed disabled:border-rule disabled:bg-transparent disabled:text-ink-3 disabled:cursor-not-allowed disabled:hover:bg-transparent disabled:hover:brightness-100",
    "aria-disabled:border-dashed aria-disabled:border-rule aria-disabled:bg-transparent aria-disabled:text-ink-3 aria-disabled:cursor-not-allowed aria-disabled:hover:bg-transparent aria-disabled:hover:brightness-100",
    tones[tone],
    tone === "bare" && "aria-disabled:border-transparent! disabled:border-transparent!",
    sizes[size],
    className,
  );
}

type ButtonProps = ButtonHTMLAttributes<HTMLButtonElement> & {
  tone?: ButtonTone;
  size?: ButtonSize;
  icon?: LucideIcon;
  /** Why the button cannot be pressed now: it stays reachable by keyboard and says the reason. */
  blockedBy?: string | undefined;
  /** Shows that the action runs; presses do nothing meanwhile. */
  busy?: boolean;
  ref?: Ref<HTMLButtonElement>;
  children?: ReactNode;
};

export function Button({
  tone,
  size,
  icon,
  blockedBy,
  busy,
  className,
  children,
  onClick,
  type = "button",
  ...rest
}: ButtonProps) {
  const blocked = Boolean(blockedBy) || busy === true;
  const button = (
    <button
      {...rest}
      type={blocked ? "button" : type}
      aria-disabled={blocked || undefined}
      aria-busy={busy || undefined}
      onClick={blocked ? (event) => event.preventDefault() : onClick}
      className={buttonClass(tone, size, className)}
    >
      {icon ? <Icon of={icon} /> : null}
      {children}
    </button>
  );
  return blockedBy ? <Tooltip text={blockedBy}>{button}</Tooltip> : button;
}

type IconButtonProps = Omit<ButtonProps, "children" | "icon"> & { icon: LucideIcon; label: string; keys?: string };

/** A square button that shows only a sign: for actions whose sign needs no word (undo, close, more). The label is its name and tooltip. */
export function IconButton({
  icon,
  label,
  keys,
  tone = "bare",
  size = "medium",
  className,
  blockedBy,
  ...rest
}: IconButtonProps) {
  const text = blockedBy ? `${label}: ${blockedBy}` : keys ? `${label} (${keys})` : label;
  const { onClick, busy, type = "button", ...others } = rest;
  const blocked = Boolean(blockedBy) || busy === true;
  return (
    <Tooltip text={text}>
      <button
        {...others}
        type={type}
        aria-label={label}
        aria-disabled={blocked || undefined}
        onClick={blocked ? (event) => event.preventDefault() : onClick}
        className={buttonClass(tone, size, cx("px-0!", size === "small" ? "w-6" : "w-7", className))}
      >
        <Icon of={icon} size={15} />
      </button>
    </Tooltip>
  );
}

type LinkButtonProps = LinkProps & { tone?: ButtonTone; size?: ButtonSize; icon?: LucideIcon | undefined };

export function LinkButton({ tone, size, icon, className, children, ...rest }: LinkButtonProps) {
  return (
    <Link {...rest} className={buttonClass(tone, size, className)}>
      {icon ? <Icon of={icon} /> : null}
      {children}
    </Link>
  );
}

/** A link in running text. */
export function TextLink({ className, ...rest }: LinkProps) {
  return (
    <Link
      {...rest}
      className={cx(
        "underline decoration-rule decoration-1 underline-offset-3 hover:decoration-copper hover:text-copper",
        className,
      )}
    />
  );
}
