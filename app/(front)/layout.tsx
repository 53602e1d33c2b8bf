import type { ReactNode } from "react";
import { Mark } from "@/modules/ui/mark";

export default function FrontLayout({ children }: { children: ReactNode }) {
  return (
    <div className="front">
      <main id="main" className="front-l">
        <div className="brand">
          <Mark />
          <span><b>Valvekeeper</b><small>for cylinder-head shops</small></span>
        </div>
        {children}
      </main>
      <div className="front-r" aria-hidden="true">
        <Mark stem="#EFF4F0" className="m" />
        <p>Keeps stock. Keeps time.<br />Keeps the books.</p>
      </div>
    </div>
  );
}
