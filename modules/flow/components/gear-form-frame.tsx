"use client";

import type { ReactNode } from "react";
import type { FieldValues } from "react-hook-form";
import { LinkButton } from "@/modules/ui/button";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import type { CommandForm as Handle } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";

/** The plate beside the list that holds one form. */
export function GearFormFrame<Input extends FieldValues, Output>({ form, title, view, save, children }: { form: Handle<Input, Output>; title: string; view: string; save: string; children: ReactNode }) {
  const { slug } = usePlace();
  return (
    <section className="plate" aria-label={title}>
      <h2 className="mb-4">{title}</h2>
      <CommandForm form={form} toFix="before this is kept">
        {children}
        <div className="form-act">
          <SubmitButton>{save}</SubmitButton>
          <LinkButton variant="lo" href={`/s/${slug}/flow/gear?view=${view}`}>Leave it</LinkButton>
        </div>
      </CommandForm>
    </section>
  );
}
