import { redirect } from "next/navigation";
import { signedIn } from "@/modules/access/session";
import { SignInForm } from "./sign-in-form";

export const metadata = { title: "Sign in" };

/** Only paths of our own are followed after sign-in. */
const ownPath = (next: string | undefined): string => (next && /^\/(?![/\\])[\w\-/?=&.%]*$/.test(next) ? next : "/");

export default async function SignIn({ searchParams }: { searchParams: Promise<{ next?: string }> }) {
  const next = ownPath((await searchParams).next);
  if (await signedIn()) redirect(next);
  return <SignInForm next={next} />;
}
