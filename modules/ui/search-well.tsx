"use client";

import clsx from "clsx";
import type { InputHTMLAttributes, Ref } from "react";
import { Icon } from "./icon";

/** Narrow-down field of a list: a real search input with the glass in the well. `label` is read, `placeholder` only helps. */
export function SearchWell({
  label,
  inputRef,
  className,
  ...rest
}: Omit<InputHTMLAttributes<HTMLInputElement>, "type"> & { label: string; inputRef?: Ref<HTMLInputElement> }) {
  return (
    <span className={clsx("in", className)}>
      <Icon name="find" size={16} />
      <input {...rest} ref={inputRef} type="search" aria-label={label} />
    </span>
  );
}
