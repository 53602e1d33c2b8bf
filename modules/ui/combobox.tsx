"use client";

import { Combobox as Base } from "@base-ui/react/combobox";
import { useMemo, useState, type ReactNode, type Ref } from "react";
import { Icon } from "./icon";

export interface ComboItem {
  id: string;
  label: string;
  /** Second line: what tells two of the same name apart. */
  detail?: string;
  /** At the right: a price, a count. */
  aside?: string;
  disabledReason?: string;
}

export interface ComboboxProps {
  /** What to list now. With `onInputValueChange` these are the answers of a search and are shown as they come. */
  items: readonly ComboItem[];
  value: ComboItem | null;
  onValueChange: (item: ComboItem | null) => void;
  /** Called with what is typed; fetch there and hand the answers back through `items`. Without it the kit filters `items`. */
  onInputValueChange?: (text: string) => void;
  loading?: boolean;
  loadingText?: string;
  /** Nothing matches. */
  emptyText?: string;
  /** Last row of the list: "Add new ...". Called with the text typed. */
  onAddNew?: (text: string) => void;
  addNewLabel?: (text: string) => string;
  placeholder?: string;
  disabled?: boolean;
  id?: string;
  invalid?: boolean;
  describedBy?: string;
  label?: string;
  /** Id of a visible label; a list that is open hides the page behind it, so the tie by `for` alone is not enough. */
  labelledBy?: string;
  /** Inside the well, before its end. */
  unit?: ReactNode;
  inputRef?: Ref<HTMLInputElement>;
  onBlur?: () => void;
}

const ADD = "\u0000add";

/**
 * A well with a list under it: type to narrow, arrows and Enter pick, Esc closes. Text that matches nothing stays in the
 * well when the focus leaves, so that it can be mended or added; only a picked item puts its own label there.
 */
export function Combobox({
  items,
  value,
  onValueChange,
  onInputValueChange,
  loading = false,
  loadingText = "Looking…",
  emptyText = "Nothing found",
  onAddNew,
  addNewLabel = (text) => (text === "" ? "Add new…" : `Add “${text}”`),
  placeholder,
  disabled,
  id,
  invalid,
  describedBy,
  label,
  labelledBy,
  unit,
  inputRef,
  onBlur,
}: ComboboxProps) {
  const remote = onInputValueChange !== undefined;
  const [text, setText] = useState(value?.label ?? "");
  const [seen, setSeen] = useState(value?.id);
  if (seen !== value?.id) {
    // Picked or cleared from outside (a new record saved, a form reset): the well follows.
    setSeen(value?.id);
    setText(value?.label ?? "");
  }
  const listed = useMemo(() => {
    const all = value !== null && remote && !items.some((i) => i.id === value.id) ? [...items, value] : [...items];
    return onAddNew === undefined ? all : [...all, { id: ADD, label: ADD }];
  }, [items, value, remote, onAddNew]);
  const { contains } = Base.useFilter();
  return (
    <Base.Root<ComboItem>
      items={listed}
      value={value}
      inputValue={text}
      itemToStringLabel={(item) => (item.id === ADD ? text : item.label)}
      itemToStringValue={(item) => item.id}
      isItemEqualToValue={(a, b) => a.id === b.id}
      disabled={disabled}
      autoHighlight
      filter={(item, query) => item.id === ADD || remote || contains(`${item.label} ${item.detail ?? ""}`, query)}
      onInputValueChange={(next, { reason }) => {
        const typed = reason === "input-change";
        const tidying = !typed && reason !== "item-press" && reason !== "clear-press";
        if (tidying && value === null) return;
        setText(next);
        if (typed) onInputValueChange?.(next);
      }}
      onValueChange={(item, details) => {
        if (item?.id === ADD) {
          details.cancel();
          onAddNew?.(text.trim());
          return;
        }
        onValueChange(item);
      }}
    >
      <Base.InputGroup className="in">
        <Base.Input
          ref={inputRef}
          id={id}
          placeholder={placeholder}
          aria-label={label}
          aria-labelledby={labelledBy}
          aria-invalid={invalid || undefined}
          aria-describedby={describedBy}
          onBlur={onBlur}
          autoComplete="off"
        />
        {unit === undefined ? null : <span className="unit">{unit}</span>}
        <Base.Trigger className="icon-btn" aria-label="Show the list">
          <Icon name="down" size={14} />
        </Base.Trigger>
      </Base.InputGroup>
      <Base.Portal>
        <Base.Positioner className="pop-place" sideOffset={5}>
          <Base.Popup className="pop" aria-busy={loading || undefined}>
            <Base.Status className="pop-status">{loading ? <div className="pop-note">{loadingText}</div> : null}</Base.Status>
            {!loading && items.length === 0 ? <div className="pop-note">{emptyText}</div> : null}
            <Base.List>
              {(item: ComboItem) =>
                item.id === ADD ? (
                  <Base.Item key={ADD} value={item} className="opt-row opt-add">
                    <Icon name="plus" size={16} weight={2} />
                    <span>{addNewLabel(text.trim())}</span>
                  </Base.Item>
                ) : (
                  <Base.Item key={item.id} value={item} className="opt-row" disabled={item.disabledReason !== undefined}>
                    <span>
                      {item.label}
                      {item.detail === undefined ? null : <small>{item.detail}</small>}
                      {item.disabledReason === undefined ? null : <small>{item.disabledReason}</small>}
                    </span>
                    {item.aside === undefined ? null : <span className="q">{item.aside}</span>}
                  </Base.Item>
                )
              }
            </Base.List>
          </Base.Popup>
        </Base.Positioner>
      </Base.Portal>
    </Base.Root>
  );
}
