"use client";

import { Icon } from "./icon";
import { Menu } from "./menu";

export interface ChipOption {
  value: string;
  label: string;
  /** Where the list goes when this is picked; with links the filter lives in the address. */
  href?: string;
}

/** Filter chip: "Station: any" with a list under it. Give the options `href`s, or `onChange`. `anyValue` is the unset one. */
export function FilterChip({
  label,
  value,
  options,
  anyValue = "",
  onChange,
}: {
  label: string;
  value: string;
  options: readonly ChipOption[];
  anyValue?: string;
  onChange?: (value: string) => void;
}) {
  const chosen = options.find((o) => o.value === value);
  return (
    <Menu
      trigger={
        <button type="button" className="chip" data-on={value === anyValue ? undefined : true}>
          {label}: {chosen?.label ?? value}
          <Icon name="down" size={14} />
        </button>
      }
      items={options.map((o) => ({
        key: o.value === "" ? "(any)" : o.value,
        label: o.label,
        icon: o.value === value ? "check" : undefined,
        href: o.href,
        onSelect: onChange === undefined ? undefined : () => onChange(o.value),
      }))}
    />
  );
}

/** On/off filter. */
export function ToggleChip({ on, onChange, children }: { on: boolean; onChange: (on: boolean) => void; children: string }) {
  return (
    <button type="button" className="chip" aria-pressed={on} onClick={() => onChange(!on)}>
      {children}
    </button>
  );
}
