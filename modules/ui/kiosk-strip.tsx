"use client";

import type { ReactNode } from "react";
import { Icon } from "./icon";
import { Mark } from "./mark";
import { Status } from "./status";

/**
 * Head of a shop-floor screen: name, a line beside it, the state of the link, the clock, Lock. No rooms.
 * `since` is the worded time the link was lost ("9:52"). `clock` is text or a ticking element.
 */
export function KioskStrip({
  name,
  sub,
  linked,
  since,
  clock,
  onLock,
  lockLabel = "Lock",
  children,
}: {
  name: string;
  sub?: ReactNode;
  linked: boolean;
  since?: string;
  clock: ReactNode;
  onLock?: () => void;
  lockLabel?: string;
  /** More keys, before Lock. */
  children?: ReactNode;
}) {
  return (
    <header className="kt">
      <Mark width={32} />
      <span className="kt-name">{name}</span>
      {sub === undefined ? null : <span className="kt-sub">{sub}</span>}
      <span role="status" className="contents">
        {linked ? (
          <Status dial="out" size={18} dim className="hide-s">
            Linked
          </Status>
        ) : (
          <span className="flag">
            <Icon name="unplug" size={20} />
            Not linked{since === undefined ? "" : ` since ${since}`}
          </span>
        )}
      </span>
      <span className="num kt-clock">{clock}</span>
      {children}
      {onLock === undefined ? null : (
        <button type="button" className="k-key" onClick={onLock}>
          <Icon name="lock" size={22} />
          {lockLabel}
        </button>
      )}
    </header>
  );
}
