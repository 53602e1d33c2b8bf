"use client";

import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { useDeferredValue, useMemo, useState, type Ref } from "react";
import { hours, money } from "@/modules/kernel/format";
import { Combobox, type ComboItem } from "@/modules/ui/combobox";
import { getJson } from "@/modules/ui/fetch-json";
import { usePlace } from "@/modules/ui/place";
import type { MenuRow } from "../queries/menu";

export interface PartChoice { id: string; sku: string; description: string; salePriceMinor: number | null; isKit: boolean; freeMilli: number }

/** One box for work and parts: a menu code, a part number or words; picking puts the line down and clears the box. */
export function AddLineBox({ menu, onWork, onPart, inputRef }: { menu: readonly MenuRow[]; onWork: (m: MenuRow) => void; onPart: (p: PartChoice) => void; inputRef: Ref<HTMLInputElement> }) {
  const place = usePlace();
  const [text, setText] = useState("");
  const [round, setRound] = useState(0);
  const q = useDeferredValue(text.trim());
  const { data, isFetching } = useQuery({
    queryKey: ["parts", place.slug, "estimate", q], queryFn: ({ signal }) => getJson<{ rows: PartChoice[] }>(`/api/v1/s/${place.slug}/parts`, { q, limit: 10 }, signal), placeholderData: keepPreviousData, enabled: q.length > 1,
  });
  const items = useMemo(() => {
    const words = q.toLowerCase().split(/\s+/).filter(Boolean);
    const work = menu.filter((m) => words.every((w) => `${m.code} ${m.name}`.toLowerCase().includes(w)))
      .map((m): ComboItem => ({ id: `w:${m.code}`, label: `${m.code}  ${m.name}`, detail: `${m.station}, ${hours(m.bookMinutes, place.locale)} h book`, aside: money(m.priceMinor, place) }));
    const parts = q.length > 1 ? (data?.rows ?? []).map((p): ComboItem => ({
      id: `p:${p.id}`, label: p.sku, detail: `${p.description}${p.isKit ? ", kit" : ""}, ${Math.floor(p.freeMilli / 1000)} free`, ...(p.salePriceMinor === null ? {} : { aside: money(p.salePriceMinor, place) }),
    })) : [];
    return [...work, ...parts];
  }, [menu, data, q, place]);
  return (
    <Combobox
      key={round} items={items} value={null} label="Add work or a part" placeholder="Add work or a part: code, number or words" inputRef={inputRef} loading={isFetching && items.length === 0} emptyText="Neither work nor part of that name"
      onInputValueChange={setText}
      onValueChange={(item) => {
        if (!item) return;
        const work = menu.find((m) => item.id === `w:${m.code}`);
        const part = data?.rows.find((p) => item.id === `p:${p.id}`);
        setText("");
        setRound((n) => n + 1);
        if (work) onWork(work);
        else if (part) onPart(part);
      }}
    />
  );
}
