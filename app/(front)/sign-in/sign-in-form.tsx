"use client";
import { signIn } from "next-auth/react";
import { useRouter } from "next/navigation";
import { useState, useSyncExternalStore, type FormEvent } from "react";
import { Note } from "@/modules/ui/note";

const WORDS: Record<string, string> = {
  CredentialsSignin: "That e-mail address and password do not go together. Check both, or ask the shop's owner for a new password.",
  TOO_MANY_TRIES: "Too many tries. Wait a minute, then try again; the right password still works.",
};

const never = () => () => undefined;

export function SignInForm({ next }: { next: string }) {
  const router = useRouter();
  const [problem, setProblem] = useState("");
  const [pending, setPending] = useState(false);
  const [shown, setShown] = useState(false);
  // Until the script runs the button is off: a plain form post has nobody to take it.
  const ready = useSyncExternalStore(never, () => true, () => false);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    const typed = (name: string) => { const v = form.get(name); return typeof v === "string" ? v : ""; };
    setPending(true);
    setProblem("");
    try {
      const answer = await signIn("credentials", { redirect: false, email: typed("email"), password: typed("password") });
      if (answer?.ok && !answer.error) {
        router.replace(next);
        router.refresh();
        return;
      }
      setProblem(WORDS[answer?.error ?? ""] ?? "Sign-in did not work. What you typed is still here; try again.");
    } catch {
      setProblem("No link to the shop. What you typed is still here; try again.");
    }
    setPending(false);
  }

  return (
    <form method="post" onSubmit={(e) => void submit(e)} className="bay grid w-full max-w-[380px] gap-4" aria-labelledby="sign-in-label">
      <h2 id="sign-in-label" className="eng ink">Sign in</h2>
      <div role="alert">{problem ? <Note tone="stop">{problem}</Note> : null}</div>
      <div className="f">
        <label htmlFor="email">E-mail address</label>
        <span className="in"><input id="email" name="email" type="email" autoComplete="username" required autoFocus className="w-full bg-transparent outline-none" /></span>
      </div>
      <div className="f">
        <label htmlFor="password">Password</label>
        <span className="in">
          <input id="password" name="password" type={shown ? "text" : "password"} autoComplete="current-password" required className="w-full bg-transparent outline-none" />
          <button type="button" className="lk text-small" aria-pressed={shown} aria-controls="password" onClick={() => setShown(!shown)}>{shown ? "Hide" : "Show"}</button>
        </span>
      </div>
      <button className="btn go" disabled={pending || !ready}>{pending ? "Signing in" : "Sign in"}</button>
      <p className="hint">Technicians clock in at the tablet with badge or PIN. Customers open the link in their mail.</p>
    </form>
  );
}
