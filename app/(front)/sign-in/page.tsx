import { redirect } from "next/navigation";
import { signedIn } from "@/modules/access/session";
import { Mark } from "@/modules/ui/mark";
import { SignInForm } from "./sign-in-form";

export const metadata = { title: "Sign in" };

/** Only paths of our own are followed after sign-in. */
const ownPath = (next: string | undefined): string => (next && /^\/(?![/\\])[\w\-/?=&.%]*$/.test(next) ? next : "/");

export default async function SignIn({ searchParams }: { searchParams: Promise<{ next?: string }> }) {
  const next = ownPath((await searchParams).next);
  if (await signedIn()) redirect(next);
  return (
    <main id="main" className="grid min-h-dvh content-center justify-items-center gap-8 p-4">
      <div className="flex items-center gap-4">
        <Mark />
        <h1 className="font-cut text-[1.75rem] leading-none font-bold">
          Valvekeeper<span className="mt-1 block font-face text-[0.9375rem] leading-tight font-normal text-ink-2">keeps stock, keeps time, keeps the books</span>
        </h1>
      </div>
      <SignInForm next={next} />
    </main>
  );
}
