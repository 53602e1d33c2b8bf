/** A copy of what is typed, in this tab only. Storage may be full or shut: the form then works without it. */
const name = (key: string) => `draft:${key}`;

export function keepDraft(key: string, values: unknown): void {
  try {
    sessionStorage.setItem(name(key), JSON.stringify(values));
  } catch {
    // Nothing to do: the text is still in the form.
  }
}

export function readDraft(key: string): Record<string, unknown> | null {
  try {
    const text = sessionStorage.getItem(name(key));
    const value: unknown = text === null ? null : JSON.parse(text);
    return typeof value === "object" && value !== null && !Array.isArray(value) ? (value as Record<string, unknown>) : null;
  } catch {
    return null;
  }
}

export function dropDraft(key: string): void {
  try {
    sessionStorage.removeItem(name(key));
  } catch {
    // Same as above.
  }
}
