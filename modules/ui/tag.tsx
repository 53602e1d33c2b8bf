import Link from "next/link";

/** The stamped tag on its wire. `running` fills it with fluid and says so to a screen reader (`runningWord`). */
export function Tag({ children, running = false, runningWord = "running", href }: { children: string; running?: boolean; runningWord?: string; href?: string }) {
  const className = running ? "tag run" : "tag";
  const body = (
    <>
      {children}
      {running ? <span className="sr-only">, {runningWord}</span> : null}
    </>
  );
  return href === undefined ? (
    <span className={className}>{body}</span>
  ) : (
    <Link href={href} className={className}>
      {body}
    </Link>
  );
}
