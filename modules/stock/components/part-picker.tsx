"use client";
import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { useDeferredValue, useState } from "react";
import type { ComboItem } from "@/modules/ui/combobox";
import { getJson } from "@/modules/ui/fetch-json";
import { ComboboxInput } from "@/modules/ui/form/combobox-input";
import type { FieldProps } from "@/modules/ui/form/use-field";
import { usePlace } from "@/modules/ui/place";
import { qtyText } from "../domain/qty-text";
import type { PartRow } from "../queries/find-parts";

const itemOf = (p: PartRow): ComboItem => ({ id: p.id, label: p.sku, detail: p.description, aside: `${qtyText(p.freeMilli, p.isKit ? "each" : p.stockUnit)} free` });

/** Part field: type a number, words or a family; the form holds the part's id. */
export function PartPicker({ initial, onPicked, kits = true, ...field }: FieldProps & { initial?: { id: string; sku: string; description: string } | null; onPicked?: (part: PartRow | null) => void; kits?: boolean }) {
  const { slug } = usePlace();
  const [text, setText] = useState("");
  const q = useDeferredValue(text);
  const { data, isFetching } = useQuery({
    queryKey: ["parts", slug, "pick", q],
    queryFn: ({ signal }) => getJson<{ rows: PartRow[] }>(`/api/v1/s/${slug}/parts`, { q, limit: 12 }, signal),
    placeholderData: keepPreviousData,
  });
  const rows = (data?.rows ?? []).filter((p) => kits || !p.isKit);
  return (
    <ComboboxInput
      {...field}
      items={rows.map(itemOf)}
      initial={initial ? { id: initial.id, label: initial.sku, detail: initial.description } : null}
      onInputValueChange={setText}
      onPicked={(item) => onPicked?.(rows.find((r) => r.id === item?.id) ?? null)}
      loading={isFetching && !data}
      emptyText="No part of that number or name"
      placeholder="Number or words"
    />
  );
}
