/** What a person typed into a field before the page's script was running. */
export interface EarlyInput {
  readonly name: string;
  /** Text of a text field or a choice; for boxes whether this one is ticked, and every ticked value of that name. */
  readonly value: string | { readonly ticked: boolean; readonly all: readonly string[] };
}

/** The few facts of a control that are read, so that this can be tried without a browser. */
type Control = Pick<HTMLInputElement, "name" | "type" | "value" | "defaultValue" | "checked" | "defaultChecked">;
type Choice = Pick<HTMLSelectElement, "name" | "type" | "value"> & { options: ArrayLike<Pick<HTMLOptionElement, "value" | "defaultSelected">> };

const NOT_TYPED = new Set(["file", "hidden", "submit", "button", "reset", "image", "fieldset", "output"]);

/** The controls of a form whose content differs from what the server sent, in their order. */
export function earlyInput(controls: Iterable<Control | Choice>): EarlyInput[] {
  const named = [...controls].filter((c) => c.name !== "" && !NOT_TYPED.has(c.type));
  const found = new Map<string, EarlyInput>();
  for (const c of named) {
    if ("options" in c) {
      const options = Array.from(c.options);
      const sent = options.find((o) => o.defaultSelected) ?? options[0];
      if (sent !== undefined && c.value !== sent.value) found.set(c.name, { name: c.name, value: c.value });
    } else if (c.type === "checkbox") {
      if (c.checked === c.defaultChecked) continue;
      const all = named.filter((o): o is Control => o.name === c.name && "checked" in o && o.checked).map((o) => o.value);
      found.set(c.name, { name: c.name, value: { ticked: c.checked, all } });
    } else if (c.type === "radio") {
      if (c.checked && !c.defaultChecked) found.set(c.name, { name: c.name, value: c.value });
    } else if (c.value !== c.defaultValue) {
      found.set(c.name, { name: c.name, value: c.value });
    }
  }
  return [...found.values()];
}
