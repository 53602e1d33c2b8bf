"use client";

import { TextInput, type TextInputProps } from "./text-input";

/** A business date. The value is ISO text (2026-03-13); the browser shows it the reader's way and brings its own calendar. */
export const DateInput = (props: Omit<TextInputProps, "type">) => <TextInput {...props} type="date" />;
