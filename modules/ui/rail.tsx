"use client";

import Link from "next/link";
import { useRouter } from "next/navigation";
import { useRef, type ReactNode } from "react";
import { Icon } from "./icon";
import { Kbd } from "./kbd";
import { Mark } from "./mark";
import { Menu, type MenuItem } from "./menu";
import { useHotkey } from "./use-hotkey";

export interface Room {
  key: string;
  label: string;
  href: string;
}

export interface RailProps {
  shopName: string;
  homeHref: string;
  /** Up to six, in the order of Alt 1 to Alt 6. */
  rooms: readonly Room[];
  /** Key of the room the page stands in; undefined on pages outside the rooms. */
  current?: string;
  /** F2. `href` goes to a page; `onOpen` opens something here and wins. */
  find?: { label: string; more?: string; description: string; href?: string; onOpen?: () => void };
  /** F4. `label` "New", `more` " work order" (dropped on a phone). */
  create?: { label: string; more?: string; href: string };
  person: { initials: string; name: string; role: string; menu?: readonly MenuItem[] };
  /** Anything before the person, e.g. a link-state flag. */
  children?: ReactNode;
}

/** The slide rule: rooms as long ticks of one scale, the current one under the fluid cursor. At the bottom edge of a phone. */
export function Rail({ shopName, homeHref, rooms, current, find, create, person, children }: RailProps) {
  const router = useRouter();
  const findRef = useRef<HTMLButtonElement>(null);
  const openFind = () => {
    if (find?.onOpen !== undefined) find.onOpen();
    else if (find?.href !== undefined) router.push(find.href);
  };
  useHotkey(find === undefined ? undefined : "F2", openFind);
  useHotkey(create === undefined ? undefined : "F4", () => {
    if (create !== undefined) router.push(create.href);
  });
  const who = (
    <>
      <b aria-hidden="true">{person.initials}</b>
      <span>
        {person.name}
        <span title={person.role}>{person.role}</span>
      </span>
    </>
  );
  return (
    <>
      <a className="skip" href="#main">
        Skip to content
      </a>
      <header className="rail">
        <Link className="brand" href={homeHref}>
          <Mark />
          <span>
            <b>Valvekeeper</b>
            <small>{shopName}</small>
          </span>
        </Link>
        <nav className="rooms" aria-label="Rooms">
          {rooms.map((room, i) => (
            <RoomLink key={room.key} room={room} digit={i + 1} here={room.key === current} />
          ))}
        </nav>
        <div className="rail-r">
          {find === undefined ? null : (
            <button ref={findRef} type="button" className="find" aria-label={find.description} aria-keyshortcuts="F2" onClick={openFind}>
              <Icon name="find" size={18} />
              <span>
                {find.label}
                {find.more === undefined ? null : <span className="lg">{find.more}</span>}
              </span>
              <Kbd>F2</Kbd>
            </button>
          )}
          {create === undefined ? null : (
            <Link className="btn go" href={create.href} aria-keyshortcuts="F4">
              <Icon name="plus" size={16} weight={2} />
              <span>
                {create.label}
                {create.more === undefined ? null : <span className="long">{create.more}</span>}
              </span>
              <Kbd>F4</Kbd>
            </Link>
          )}
          {children}
          {person.menu === undefined ? (
            <div className="who">{who}</div>
          ) : (
            <Menu
              align="end"
              items={person.menu}
              trigger={
                <button type="button" className="who" aria-label={`${person.name}, ${person.role}`}>
                  {who}
                </button>
              }
            />
          )}
        </div>
      </header>
    </>
  );
}

function RoomLink({ room, digit, here }: { room: Room; digit: number; here: boolean }) {
  const router = useRouter();
  useHotkey(`Alt+${digit}`, () => router.push(room.href));
  return (
    <Link href={room.href} aria-current={here ? "page" : undefined} aria-keyshortcuts={`Alt+${digit}`}>
      <i aria-hidden="true">Alt {digit}</i>
      <span>{room.label}</span>
      {here ? <em aria-hidden="true" /> : null}
    </Link>
  );
}
