"use client";

import { TextInput, type TextInputProps } from "./text-input";

/**
 * A figure, typed as text with a decimal comma or point: a number input of the browser would drop what it cannot read, and
 * typed text is never dropped. The schema judges it.
 */
export const NumberInput = ({ whole = false, ...props }: TextInputProps & { whole?: boolean }) => (
  <TextInput inputMode={whole ? "numeric" : "decimal"} autoComplete="off" {...props} />
);
