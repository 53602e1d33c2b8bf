"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { amount, hours } from "@/modules/kernel/format";
import { minorText } from "@/modules/kernel/money";
import { Bay, Bays } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { DataTable } from "@/modules/ui/data-table";
import type { DataColumn } from "@/modules/ui/data-table-columns";
import { EmptyState } from "@/modules/ui/empty-state";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { CommandForm } from "@/modules/ui/form/command-form";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { NumberInput } from "@/modules/ui/form/number-input";
import { RadioRow } from "@/modules/ui/form/radio-row";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace, type PlaceFacts } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { addMenuOperationAction, changeMenuOperationAction } from "../actions";
import { STATIONS } from "../domain/floor-station";
import { menuEditInput, menuInput } from "../input";
import type { MenuRow } from "../queries/menu";

const columns = (place: PlaceFacts): DataColumn<MenuRow>[] => [
  { id: "sequence", head: "Order", align: "end", figures: true, sortBy: (m) => m.sequence, cell: (m) => <span className="mid">{m.sequence}</span>, width: 70 },
  { id: "code", head: "Code", primary: true, sortBy: (m) => m.code, cell: (m) => <span className="ord">{m.code}</span> },
  { id: "name", head: "Operation", sortBy: (m) => m.name, cell: (m) => <><b className="b">{m.name}</b>{m.active ? null : <span className="dim"> (retired)</span>}</> },
  { id: "station", head: "Station", cell: (m) => <span className="mid">{m.station}</span>, desktopOnly: true },
  { id: "skill", head: "Machine, skill", cell: (m) => <span className="mid">{m.skill}</span>, desktopOnly: true },
  { id: "book", head: "Book h", align: "end", figures: true, sortBy: (m) => m.bookMinutes, cell: (m) => hours(m.bookMinutes, place.locale) },
  { id: "price", head: `Price ${place.currency}`, align: "end", figures: true, sortBy: (m) => m.priceMinor, cell: (m) => <>{amount(m.priceMinor, place)}{m.billing === "hourly" ? <span className="dim">/h</span> : null}</> },
];

/** The priced menu: a table, and the form of the picked row beside it. */
export function MenuTable({ rows }: { rows: readonly MenuRow[] }) {
  const place = usePlace();
  const [picked, setPicked] = useState<string | null>(null);
  const row = rows.find((r) => r.id === picked) ?? null;
  const next = Math.max(0, ...rows.map((r) => r.sequence)) + 10;
  return (
    <div className="split" style={{ "--side": "400px" } as React.CSSProperties}>
      <DataTable
        caption="Menu of operations" columns={columns(place)} rows={rows} rowKey={(m) => m.id} picked={picked} onPick={(m) => setPicked(m.id)} onOpen={(m) => setPicked(m.id)}
        compact={(m) => <span className="row2"><b className="ord">{m.code}</b><b>{m.name}</b><span className="q at-r">{amount(m.priceMinor, place)}</span><span className="l2 mid">{m.station}</span><span className="q at-r mid">{hours(m.bookMinutes, place.locale)} h</span></span>}
        empty={<EmptyState title="Nothing on the menu yet">Add the first operation beside. Estimates are written from this list.</EmptyState>}
      />
      <Bays>
        {row ? <Bay label={`Change ${row.code}`} aside={<Button size="sm" variant="lo" onClick={() => setPicked(null)}>Add another</Button>}><MenuForm key={`${row.id}${row.version}`} row={row} next={next} /></Bay>
          : <Bay label="Add an operation"><MenuForm key={`new${rows.length}`} row={null} next={next} /></Bay>}
        <p className="sm dim">A new price or hour counts for estimates written from now on. What was agreed keeps its price.</p>
      </Bays>
    </div>
  );
}

function MenuForm({ row, next }: { row: MenuRow | null; next: number }) {
  const { slug, currency } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const values = {
    code: row?.code ?? "", name: row?.name ?? "", customerWords: row?.customerWords ?? "", station: row?.station as (typeof STATIONS)[number] | undefined, skill: row?.skill ?? "", sequence: String(row?.sequence ?? next),
    bookHours: row ? String(row.bookMinutes / 60) : "", price: row ? minorText(row.priceMinor) : "", billing: (row?.billing === "hourly" ? "hourly" : "fixed") as "hourly" | "fixed",
    needsBefore: row?.needsBefore ?? [], mustRecord: row?.mustRecord ?? "", hazards: row?.hazards ?? [],
  };
  const done = (text: string) => { toast({ text }); router.refresh(); };
  const add = useCommandForm({ schema: menuInput, defaultValues: values, action: (sent) => addMenuOperationAction(slug, sent), onDone: (v) => done(`${v.code} is on the menu`) });
  const edit = useCommandForm({
    schema: menuEditInput, defaultValues: { ...values, id: row?.id ?? "", version: row?.version ?? 1, active: row?.active ?? true }, action: (sent) => changeMenuOperationAction(slug, sent), onDone: () => done(`${row?.code ?? ""} is changed`),
  });
  const fields = (
    <>
      <div className="fields">
        <TextInput name="code" label="Code" readOnly={row !== null} hint={row ? "Stays, because orders refer to it." : "2 to 8 letters and digits."} />
        <NumberInput name="sequence" label="Order on the routing" hint="Lower comes first." />
        <TextInput className="full" name="name" label="Bench words" />
        <TextInput className="full" name="customerWords" label="Customer words" optional />
        <SelectInput name="station" label="Station" placeholder="Choose" options={STATIONS.map((s) => ({ value: s, label: s }))} />
        <TextInput name="skill" label="Machine, skill" />
        <NumberInput name="bookHours" label="Book hours" unit="h" />
        <MoneyInput name="price" label="Price" currency={currency} />
        <RadioRow className="full" name="billing" label="Billed" options={[{ value: "fixed", label: "By the piece of work" }, { value: "hourly", label: "By the hour" }]} />
        <TextInput className="full" name="mustRecord" label="Must be recorded" optional hint="Printed on the traveler beside a blank." />
        {row ? <Checkbox className="full" name="active" label="On the menu" hint="Retired operations stay on the orders that have them." /> : null}
      </div>
      <div className="form-act"><SubmitButton>{row ? "Save" : "Add to the menu"}</SubmitButton></div>
    </>
  );
  return row ? <CommandForm form={edit} label={`Change ${row.code}`}>{fields}</CommandForm> : <CommandForm form={add} label="Add an operation">{fields}</CommandForm>;
}
