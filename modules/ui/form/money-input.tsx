"use client";

import { TextInput, type TextInputProps } from "./text-input";

/** An amount, comma or point, with the currency code inside the well. */
export const MoneyInput = ({ currency, ...props }: Omit<TextInputProps, "unit"> & { currency: string }) => (
  <TextInput inputMode="decimal" autoComplete="off" unit={currency} {...props} />
);
