"use client";

import { time } from "@/modules/kernel/format";
import { Icon } from "@/modules/ui/icon";
import type { KeptItem } from "./store";

/** What waits on the tablet, one by one. */
export function KeptList({ kept, place, onTry }: { kept: readonly KeptItem[]; place: { locale: string; zone: string }; onTry: () => void }) {
  return (
    <div>
      <div className="k-h" style={{ margin: "22px 0 2px" }}>
        <h2 className="eng">Waiting to send, {kept.length}</h2>
        <button type="button" className="k-key" style={{ minHeight: 56, fontSize: "1.0625rem" }} onClick={onTry}>Try now</button>
      </div>
      <ul className="kept">
        {kept.map((item) => (
          <li key={item.counter}>
            <time className="mid" dateTime={item.deviceAt}>{time(item.deviceAt, place)}</time>
            <span><b>{item.word}</b> {item.text}{item.refused ? <span className="mid block">{item.refused}</span> : null}</span>
            <span className="nw"><Icon name={item.refused ? "warn" : "clock"} size={18} className="mr-1 inline" /><b>{item.refused ? "Kept, see the lead" : "Kept"}</b></span>
          </li>
        ))}
      </ul>
    </div>
  );
}
