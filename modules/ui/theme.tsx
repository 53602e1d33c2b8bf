import type { ReactNode } from "react";

/**
 * Puts a screen of the shop floor (bench, clock) on the dark ground. The whole document follows, dialogs and toasts too,
 * without a script: the stylesheet looks for `.ground-dark`.
 */
export const DarkGround = ({ children }: { children: ReactNode }) => (
  <div data-theme="dark" className="ground-dark">
    {children}
  </div>
);
