"use client";

import { useState } from "react";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Note } from "@/modules/ui/note";
import { TextLink } from "@/modules/ui/text-link";
import { PASSWORD_LENGTH_MIN } from "../domain/password-rules";
import { acceptInvitationAction } from "../join-actions";
import { joinInput } from "../join-input";

export function JoinForm({ token, email }: { token: string; email: string }) {
  const [done, setDone] = useState(false);
  const form = useCommandForm({ schema: joinInput, defaultValues: { token, password: "" }, action: (sent) => acceptInvitationAction(token, sent), onDone: () => setDone(true), guard: false });
  if (done) return <Note tone="info" live title="That is set.">Now <TextLink href="/sign-in">sign in</TextLink> with {email}.</Note>;
  return (
    <CommandForm form={form} toFix="before you can sign in">
      <input type="hidden" autoComplete="username" value={email} readOnly />
      <div className="fields one"><TextInput name="password" label="Password" type="password" autoComplete="new-password" hint={`At least ${PASSWORD_LENGTH_MIN} characters; a few words do well. If this address signs in to another shop here, type the password it has.`} /></div>
      <div className="form-act"><SubmitButton pendingText="Setting…">Set password</SubmitButton></div>
    </CommandForm>
  );
}
