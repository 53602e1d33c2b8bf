/** `application/x-www-form-urlencoded` with brackets, as the provider's API takes it: `a[b][0][c]=x`. */
export type FormValue = string | FormValue[] | { [name: string]: FormValue };
export type Form = Record<string, FormValue>;

interface Branch {
  [name: string]: string | Branch;
}

/** Objects whose names are 0, 1, 2 … are lists. */
function settled(value: string | Branch): FormValue {
  if (typeof value === "string") return value;
  const names = Object.keys(value);
  const isList = names.length > 0 && names.every((name, i) => name === String(i));
  if (isList) return names.map((name) => settled(value[name] ?? ""));
  return Object.fromEntries(names.map((name) => [name, settled(value[name] ?? "")]));
}

export function readForm(text: string): Form {
  const root = Object.create(null) as Branch;
  for (const [key, value] of new URLSearchParams(text)) {
    const [first, ...rest] = key.split("[").map((part) => part.replace(/\]$/, ""));
    const path = [first ?? "", ...rest];
    let at = root;
    path.forEach((name, i) => {
      // `expand[]=a&expand[]=b`: an empty name appends.
      const own = name === "" ? String(Object.keys(at).length) : name;
      if (i === path.length - 1) {
        at[own] = value;
        return;
      }
      const next = at[own];
      at = typeof next === "object" ? next : ((at[own] = Object.create(null) as Branch));
    });
  }
  return settled(root) as Form;
}

export const textOf = (form: Form, name: string): string | null => {
  const value = form[name];
  return typeof value === "string" && value !== "" ? value : null;
};

export const formOf = (form: Form, name: string): Form | null => {
  const value = form[name];
  return typeof value === "object" && !Array.isArray(value) ? value : null;
};

export const listOf = (form: Form, name: string): FormValue[] => {
  const value = form[name];
  return Array.isArray(value) ? value : [];
};

export function textsOf(form: Form | null): Record<string, string> {
  return Object.fromEntries(Object.entries(form ?? {}).filter((entry): entry is [string, string] => typeof entry[1] === "string"));
}
