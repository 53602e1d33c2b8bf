"use client";

import { Menu as BaseMenu } from "@base-ui/react/menu";
import Link from "next/link";
import type { ReactElement, ReactNode } from "react";
import { Icon, type IconName } from "./icon";
import { Kbd } from "./kbd";

export type MenuItem =
  | {
      key: string;
      label: string;
      icon?: IconName;
      keycap?: string;
      href?: string;
      onSelect?: () => void;
      /** Given: the item is listed but cannot be picked, and this says why. */
      disabledReason?: string;
    }
  | { key: string; separator: true };

/** A list of things to do, opened by `trigger` (an element, usually a button). Arrows, first letters, Enter, Esc. */
export function Menu({ trigger, items, align = "start" }: { trigger: ReactElement; items: readonly MenuItem[]; align?: "start" | "end" }) {
  return (
    <BaseMenu.Root>
      <BaseMenu.Trigger render={trigger} />
      <BaseMenu.Portal>
        <BaseMenu.Positioner className="pop-place" sideOffset={6} align={align}>
          <BaseMenu.Popup className="pop">
            {items.map((item) =>
              "separator" in item ? (
                <BaseMenu.Separator key={item.key} className="pop-sep" />
              ) : (
                <BaseMenu.Item
                  key={item.key}
                  className="opt-row"
                  disabled={item.disabledReason !== undefined}
                  onClick={item.onSelect}
                  label={item.label}
                  render={item.href !== undefined && item.disabledReason === undefined ? <Link href={item.href} /> : undefined}
                >
                  <MenuRow icon={item.icon} keycap={item.keycap} why={item.disabledReason}>
                    {item.label}
                  </MenuRow>
                </BaseMenu.Item>
              ),
            )}
          </BaseMenu.Popup>
        </BaseMenu.Positioner>
      </BaseMenu.Portal>
    </BaseMenu.Root>
  );
}

function MenuRow({ icon, keycap, why, children }: { icon?: IconName; keycap?: string; why?: string; children: ReactNode }) {
  return (
    <>
      {icon === undefined ? null : <Icon name={icon} size={18} />}
      <span>
        {children}
        {why === undefined ? null : <small>{why}</small>}
      </span>
      {keycap === undefined ? null : <Kbd>{keycap}</Kbd>}
    </>
  );
}
