"use client";

import { Button, type ButtonProps } from "../button";
import { useFormInfo } from "./form-context";

/** The form's one filled key. It is never greyed out for missing input: pressing it says what is missing. */
export function SubmitButton({ variant = "go", pendingText = "Saving…", ...rest }: Omit<ButtonProps, "type" | "pending">) {
  const { pending } = useFormInfo();
  return <Button {...rest} type="submit" variant={variant} pending={pending} pendingText={pendingText} />;
}
