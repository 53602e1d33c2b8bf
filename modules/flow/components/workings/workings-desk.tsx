"use client";

import { useSearchParams } from "next/navigation";
import { useRef, useState } from "react";
import { EmptyState } from "@/modules/ui/empty-state";
import { WORKINGS, workingOf } from "../../workings/registry";
import { addressOf, typedOfAddress, type Typed } from "../../workings/typed-inputs";
import { WorkingForm } from "./working-form";
import { WorkingsList } from "./workings-list";

/** The list of functions, and the one in hand. What is typed stands in the address, so that a working can be sent on; going back to one brings its inputs back. */
export function WorkingsDesk({ estimatesOn }: { estimatesOn: boolean }) {
  const asked = useSearchParams();
  const kept = useRef(new Map<string, Typed>());
  const [picked, setPicked] = useState(false);
  const name = asked.get("f") ?? "";
  const working = workingOf(name);
  const pick = (next: string) => {
    if (next === name) return;
    setPicked(true);
    window.history.pushState(null, "", next === "" ? window.location.pathname : addressOf(next, kept.current.get(next) ?? {}));
  };
  return (
    <div className="wk">
      <WorkingsList current={name} onPick={pick} className={working ? "hide-s" : undefined} />
      <div>
        {working ? (
          <>
            <p className="only-phone noprint mb-4"><a className="lk" href="?" onClick={(e) => { e.preventDefault(); pick(""); }}>All {WORKINGS.length} workings</a></p>
            <WorkingForm key={name} working={working} first={typedOfAddress(working, new URLSearchParams(asked.toString()))} estimatesOn={estimatesOn} takeFocus={picked} onTyped={(typed) => kept.current.set(name, typed)} />
          </>
        ) : (
          <div className={name === "" ? "hide-s" : undefined}>
            <EmptyState title={name === "" ? "No working in hand" : "There is no working of this name"}>Pick one from the list, or type a word of it into the search. Its answer stands beside it as you type.</EmptyState>
          </div>
        )}
      </div>
    </div>
  );
}
