"use client";
import { signIn } from "next-auth/react";
import Link from "next/link";
import { useRouter } from "next/navigation";
import { useState, type FormEvent } from "react";
import { AWAY_WORDS } from "@/modules/kernel/away";
import { Note } from "@/modules/ui/note";
import { useReady } from "@/modules/ui/use-ready";

const WORDS: Record<string, string> = {
  CredentialsSignin: "That e-mail address and password do not go together. Check both, or ask the shop's owner for a new password.",
  TRY_AGAIN: AWAY_WORDS.nothing,
  TOO_MANY_TRIES: "Too many tries. Wait a minute, then try again; the right password still works.",
};

export function SignInForm({ next }: { next: string }) {
  const router = useRouter();
  const [problem, setProblem] = useState("");
  const [pending, setPending] = useState(false);
  const [shown, setShown] = useState(false);
  // Until the script runs the button is off: a plain form post has nobody to take it.
  const ready = useReady();

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
    <form method="post" onSubmit={(e) => void submit(e)} aria-labelledby="sign-in-label">
      <h1 id="sign-in-label">Sign in</h1>
      <div role="alert">{problem ? <Note tone="stop">{problem}</Note> : null}</div>
      <div className="field">
        <label htmlFor="email">E-mail</label>
        <span className="in"><input id="email" name="email" type="email" autoComplete="username" required autoFocus className="w-full bg-transparent outline-none" /></span>
      </div>
      <div className="field">
        <label htmlFor="password">Password</label>
        <span className="in">
          <input id="password" name="password" type={shown ? "text" : "password"} autoComplete="current-password" required className="w-full bg-transparent outline-none" />
          <button type="button" className="lk text-small" aria-pressed={shown} aria-controls="password" onClick={() => setShown(!shown)}>{shown ? "Hide" : "Show"}</button>
        </span>
      </div>
      <button className="btn go" disabled={pending || !ready} data-waking={ready ? undefined : ""}>{pending ? "Signing in" : "Sign in"}</button>
      <p className="sm mid border-t border-line pt-4">On the shop floor? <Link className="lk" href="/clock">Use badge or PIN</Link></p>
    </form>
  );
}
