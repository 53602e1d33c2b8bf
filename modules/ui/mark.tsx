/** The mark: two split keepers close on a grooved stem. Minimum 20 px wide. `stem` takes the fluid. */
export function Mark({ width = 34, stem = "var(--fluid)", className = "mark" }: { width?: number; stem?: string; className?: string }) {
  return (
    <svg className={className} width={width} height={(width * 38) / 34} viewBox="0 0 34 38" fill="none" aria-hidden="true">
      <path
        d="M1.5 5.5h10.3c.5 0 .9.4.9.9v4.2l1.5 1.6v2.6l-1.5 1.6V33.5h-2.2c-.9 0-1.6-.5-1.9-1.3L.6 6.8c-.2-.6.2-1.3.9-1.3Z"
        fill="currentColor"
      />
      <path
        d="M32.5 5.5H22.2c-.5 0-.9.4-.9.9v4.2l-1.5 1.6v2.6l1.5 1.6V33.5h2.2c.9 0 1.6-.5 1.9-1.3L33.4 6.8c.2-.6-.2-1.3-.9-1.3Z"
        fill="currentColor"
      />
      <path
        d="M14.5 2.6 15.6 1h2.8l1.1 1.6v7.3l-1.3 1.5v4.2l1.3 1.5V37h-5V17.1l1.3-1.5v-4.2l-1.3-1.5Z"
        fill={stem}
        stroke="currentColor"
        strokeWidth="1.2"
        strokeLinejoin="round"
      />
    </svg>
  );
}

/** Joint of two lines: the keepers close on the stem when locked, dashed ring while proposed. */
export function Joint({ state }: { state: "proposed" | "locked" }) {
  return (
    <span className={state === "locked" ? "joint on" : "joint pro"}>
      <Mark width={26} stem={state === "locked" ? "var(--fluid)" : "var(--panel)"} />
    </span>
  );
}
