import { Fragment, type ReactNode } from "react";
import { Kbd } from "./kbd";

export interface KeyHint {
  keys: readonly string[];
  does: ReactNode;
}

/** A row of keys and what they do. Not shown on a phone, which has no keys. */
export function KeyHints({ hints }: { hints: readonly KeyHint[] }) {
  return (
    <div className="keys">
      {hints.map((h) => (
        <span key={h.keys.join("+")}>
          {h.keys.map((k) => (
            <Fragment key={k}>
              <Kbd>{k}</Kbd>
            </Fragment>
          ))}
          {h.does}
        </span>
      ))}
    </div>
  );
}
