"use client";

import { useState } from "react";
import { dateTime } from "@/modules/kernel/format";
import { Bay } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { usePlace } from "@/modules/ui/place";

/** Signing in at the office: the address by which the person sets their own password. */
export function InvitationBay({ hasSignIn, email, invitation }: { hasSignIn: boolean; email: string; invitation: { address: string; until: string } | null }) {
  const place = usePlace();
  const [shown, setShown] = useState(false);
  return (
    <Bay label="Signing in">
      {hasSignIn ? <p>Signs in with {email}.</p> : !invitation ? <p className="mid">Keep an e-mail address first; then an invitation can be made.</p> : shown ? (
        <>
          <label htmlFor="invitation" className="eng ink">Invitation for {email}</label>
          <div className="in mt-2"><input id="invitation" readOnly value={invitation.address} onFocus={(e) => e.target.select()} /></div>
          <p className="mid sm mt-2">Hand it to the person yourself. It works once, until {dateTime(invitation.until, place)}; changing the person makes it void.</p>
        </>
      ) : <Button onClick={() => setShown(true)}>Show an invitation</Button>}
    </Bay>
  );
}
