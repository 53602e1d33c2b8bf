"use client";

import clsx from "clsx";
import Link from "next/link";
import { useId, useRef, type ButtonHTMLAttributes, type ReactNode } from "react";
import { Icon, type IconName } from "./icon";
import { Kbd } from "./kbd";
import { useHotkey } from "./use-hotkey";

export type ButtonVariant = "go" | "plain" | "lo" | "live";
export type ButtonSize = "sm" | "m" | "xl";

interface Look {
  /** `go` filled, one a screen; `plain` outlined; `lo` quiet; `live` the fluid key of a kiosk or keypad. */
  variant?: ButtonVariant;
  size?: ButtonSize;
  icon?: IconName;
  /** Key cap printed on the control, e.g. "F9". With `hotkey` the key also presses it. */
  keycap?: string;
  full?: boolean;
  className?: string;
  children: ReactNode;
}

const look = ({ variant = "plain", size = "m", full, className }: Pick<Look, "variant" | "size" | "full" | "className">) =>
  clsx("btn", variant !== "plain" && variant, size !== "m" && size, full && "full", className);

function Body({ icon, keycap, size, children }: Pick<Look, "icon" | "keycap" | "size" | "children">) {
  return (
    <>
      {icon === undefined ? null : <Icon name={icon} size={size === "sm" ? 18 : size === "xl" ? 22 : 18} weight={icon === "plus" ? 2 : 1.6} />}
      <span>{children}</span>
      {keycap === undefined ? null : <Kbd>{keycap}</Kbd>}
    </>
  );
}

export interface ButtonProps extends Look, Omit<ButtonHTMLAttributes<HTMLButtonElement>, "children" | "className"> {
  /** While true the key keeps its place and focus, shows `pendingText` and takes no second press. */
  pending?: boolean;
  pendingText?: string;
  /** Why it cannot be pressed. The key stays focusable, is dashed, and the reason is shown after it and read with it. */
  disabledReason?: string;
  /** Combination that presses it from anywhere on the page, e.g. "F9". Never a single letter. */
  hotkey?: string;
}

export function Button({
  variant = "plain",
  size = "m",
  icon,
  keycap,
  full,
  className,
  children,
  pending = false,
  pendingText,
  disabledReason,
  hotkey,
  type = "button",
  onClick,
  ...rest
}: ButtonProps) {
  const whyId = useId();
  const ref = useRef<HTMLButtonElement>(null);
  const blocked = pending || disabledReason !== undefined;
  useHotkey(hotkey, () => ref.current?.click(), { enabled: !rest.disabled && !blocked });
  const button = (
    <button
      {...rest}
      ref={ref}
      type={type}
      className={look({ variant, size, full, className })}
      aria-disabled={blocked || undefined}
      aria-describedby={clsx(disabledReason !== undefined && whyId, rest["aria-describedby"]) || undefined}
      data-pending={pending || undefined}
      onClick={(event) => {
        if (blocked) {
          event.preventDefault();
          return;
        }
        onClick?.(event);
      }}
    >
      <Body icon={icon} keycap={keycap ?? hotkey} size={size}>
        {pending ? (pendingText ?? children) : children}
      </Body>
    </button>
  );
  if (disabledReason === undefined) return button;
  return (
    <span className="inline-flex flex-wrap items-center gap-x-3 gap-y-1">
      {button}
      <span id={whyId} className="btn-why">
        {disabledReason}
      </span>
    </span>
  );
}

export interface LinkButtonProps extends Look {
  href: string;
  /** Opens in a new tab; the reader is told so. */
  newTab?: boolean;
  prefetch?: boolean;
  download?: boolean | string;
  "aria-label"?: string;
}

/** A link that looks like a key. `download` and `newTab` use a plain anchor, so that files are not fetched as pages. */
export function LinkButton({ variant = "plain", size = "m", icon, keycap, full, className, children, href, newTab = false, prefetch, download, ...rest }: LinkButtonProps) {
  const classes = look({ variant, size, full, className });
  const body = (
    <Body icon={icon} keycap={keycap} size={size}>
      {children}
      {newTab ? <span className="sr-only"> (opens in a new tab)</span> : null}
    </Body>
  );
  if (newTab || download !== undefined) {
    return (
      <a href={href} className={classes} download={download} target={newTab ? "_blank" : undefined} rel={newTab ? "noopener" : undefined} {...rest}>
        {body}
      </a>
    );
  }
  return (
    <Link href={href} prefetch={prefetch} className={classes} {...rest}>
      {body}
    </Link>
  );
}
