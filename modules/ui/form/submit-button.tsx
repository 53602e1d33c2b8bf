"use client";

import { Button, type ButtonProps } from "../button";
import { useReady } from "../use-ready";
import { useFormInfo } from "./form-context";

/** The form's one filled key. It is never greyed out for missing input: pressing it says what is missing. */
export function SubmitButton({ variant = "go", pendingText = "Saving…", ...rest }: Omit<ButtonProps, "type" | "pending">) {
  const { pending } = useFormInfo();
  // Off until the script runs, which also keeps Enter from posting the bare form to nobody; it looks as it will in a moment.
  const ready = useReady();
  return <Button {...rest} disabled={!ready || rest.disabled} data-waking={ready ? undefined : ""} type="submit" variant={variant} pending={pending} pendingText={pendingText} />;
}
