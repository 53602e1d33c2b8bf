import type { ReactNode } from "react";

/** Status dials: one circle, nine readings. Shape carries the meaning, never hue. */
const faces = {
  draft: <circle cx="8" cy="8" r="6" strokeDasharray="1.5 2.27" />,
  wait: (
    <>
      <circle cx="8" cy="8" r="6" />
      <path d="M8 4.5V8l2.4 1.5" />
    </>
  ),
  queue: <circle cx="8" cy="8" r="6" />,
  work: (
    <>
      <circle cx="8" cy="8" r="6" />
      <path d="M8 2a6 6 0 0 1 0 12Z" fill="currentColor" />
    </>
  ),
  short: <path d="M8 2a6 6 0 1 0 6 6H8Z" />,
  hold: (
    <>
      <circle cx="8" cy="8" r="6" />
      <path d="M6.3 5.5v5M9.7 5.5v5" />
    </>
  ),
  ready: (
    <>
      <circle cx="8" cy="8" r="6" fill="currentColor" />
      <path d="m5.2 8.3 2 2 3.7-4.3" stroke="var(--panel)" />
    </>
  ),
  out: (
    <>
      <circle cx="8" cy="8" r="6" />
      <path d="m5.2 8.3 2 2 3.7-4.3" />
    </>
  ),
  late: (
    <>
      <path d="M8 1.8 15 14H1Z" fill="currentColor" />
      <path d="M8 6v3.6M8 11.8v.1" stroke="var(--panel)" />
    </>
  ),
} as const satisfies Record<string, ReactNode>;

export type DialName = keyof typeof faces;
export const dialNames = Object.keys(faces) as DialName[];

export function Dial({ name, size = 16 }: { name: DialName; size?: number }) {
  return (
    <svg
      width={size}
      height={size}
      viewBox="0 0 16 16"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.5"
      strokeLinecap="round"
      strokeLinejoin="round"
      aria-hidden="true"
    >
      {faces[name]}
    </svg>
  );
}
