import type { ReactNode } from "react";

/** Drawn for this product: 20 px box, round stroke, no fills. Never shown without a word beside it or an aria-label. */
const paths = {
  find: (
    <>
      <circle cx="8.5" cy="8.5" r="5.25" />
      <path d="M12.5 12.5 17 17" />
    </>
  ),
  plus: <path d="M10 4v12M4 10h12" />,
  minus: <path d="M4 10h12" />,
  warn: (
    <>
      <path d="M10 3 18 17H2Z" />
      <path d="M10 8v4.2M10 14.6v.2" />
    </>
  ),
  check: <path d="m4 10.5 4 4 8-9" />,
  clock: (
    <>
      <circle cx="10" cy="10" r="7" />
      <path d="M10 6v4.2l3 1.8" />
    </>
  ),
  tube: (
    <>
      <path d="M6 3v9.5a4 4 0 0 0 8 0V3" />
      <path d="M6 8h0M14 11h0M4 3h4M12 3h4" />
    </>
  ),
  valve: <path d="M10 2v9.5M4 17.5h12c-3.8-1.2-5.2-3-5.2-6h-1.6c0 3-1.4 4.8-5.2 6Z" />,
  box: <path d="M3 6.5 10 3l7 3.5v7L10 17l-7-3.5ZM3 6.5 10 10l7-3.5M10 10v7" />,
  print: <path d="M6 8V3h8v5M6 14H3V8h14v6h-3M6 12h8v5H6Z" />,
  send: <path d="M17 3 9 11M17 3l-5 14-3-6-6-3Z" />,
  lock: <path d="M5 9h10v8H5ZM7 9V6.5a3 3 0 0 1 6 0V9" />,
  badge: (
    <>
      <path d="M5 4h10v13H5ZM8 4V2h4v2" />
      <circle cx="10" cy="9" r="1.8" />
      <path d="M7.3 14c.6-1.4 4.8-1.4 5.4 0" />
    </>
  ),
  unplug: <path d="M3 17 7 13M6 9l5 5-1.5 1.5a3.5 3.5 0 0 1-5-5ZM17 3l-3.5 3.5M9.5 6 11 4.5a3.5 3.5 0 0 1 5 5L14.5 11" />,
  cam: (
    <>
      <path d="M3 6h3.5L8 4h4l1.5 2H17v10H3Z" />
      <circle cx="10" cy="11" r="2.8" />
    </>
  ),
  right: <path d="M4 10h12M11.5 5.5 16 10l-4.5 4.5" />,
  left: <path d="M16 10H4M8.5 5.5 4 10l4.5 4.5" />,
  up: <path d="m5 12 5-5 5 5" />,
  down: <path d="m5 8 5 5 5-5" />,
  x: <path d="m5 5 10 10M15 5 5 15" />,
  phone: <path d="M6.5 2h7v16h-7ZM9.5 15.5h1" />,
  call: <path d="M4 3h3l1.5 4-2 1.5a9 9 0 0 0 5 5l1.5-2 4 1.5v3c0 .6-.5 1-1 1A13 13 0 0 1 3 4c0-.5.4-1 1-1Z" />,
  swap: <path d="M4 7h11M12 4l3 3-3 3M16 13H5M8 10l-3 3 3 3" />,
  stop: <path d="M5.5 5.5h9v9h-9Z" />,
  play: <path d="M6 4.5v11l9-5.5Z" />,
  note: <path d="M5 3h10v14H5ZM8 7h4M8 10h4M8 13h2" />,
  flag: <path d="M5 18V3h10l-2.5 3.5L15 10H5" />,
  card: <path d="M2.5 5h15v10h-15ZM2.5 8.5h15" />,
  link: <path d="M8 12.5 12.5 8M9 6l1.5-1.5a3.5 3.5 0 0 1 5 5L14 11M11 14l-1.5 1.5a3.5 3.5 0 0 1-5-5L6 9" />,
  edit: <path d="M4 16v-3L13 4l3 3-9 9Z" />,
} as const satisfies Record<string, ReactNode>;

export type IconName = keyof typeof paths;

export const iconNames = Object.keys(paths) as IconName[];

/** `size` in px, `weight` is the stroke in the 20 px box. Hidden from screen readers: the word beside it speaks. */
export function Icon({ name, size = 20, weight = 1.6, className }: { name: IconName; size?: number; weight?: number; className?: string }) {
  return (
    <svg
      className={className}
      width={size}
      height={size}
      viewBox="0 0 20 20"
      fill="none"
      stroke="currentColor"
      strokeWidth={weight}
      strokeLinecap="round"
      strokeLinejoin="round"
      aria-hidden="true"
    >
      {paths[name]}
    </svg>
  );
}
