"use client";

import { AlertDialog } from "@base-ui/react/alert-dialog";
import { Dialog as BaseDialog } from "@base-ui/react/dialog";
import clsx from "clsx";
import type { ReactElement, ReactNode } from "react";
import { Button } from "./button";

interface OpenState {
  /** Element that opens it; focus returns there on close. Leave out and use `open` when something else opens it. */
  trigger?: ReactElement;
  open?: boolean;
  onOpenChange?: (open: boolean) => void;
}

/**
 * A question before something that cannot be taken back. The question holds the verb and the amount ("Issue invoice 1187 for
 * $3,164.93?"). The safe choice comes first and takes the focus; Esc is the safe choice. While `pending` it stays open.
 */
export function ConfirmDialog({
  trigger,
  open,
  onOpenChange,
  question,
  children,
  safe,
  action,
  onAction,
  pending = false,
  pendingText,
}: OpenState & {
  question: string;
  children?: ReactNode;
  /** Words of the safe choice: "Not yet", "Keep it". */
  safe: string;
  /** Words of the named action: "Issue it". */
  action: string;
  onAction: () => void;
  pending?: boolean;
  pendingText?: string;
}) {
  return (
    <AlertDialog.Root open={open} onOpenChange={(next) => (pending ? undefined : onOpenChange?.(next))}>
      {trigger === undefined ? null : <AlertDialog.Trigger render={trigger} />}
      <AlertDialog.Portal>
        <AlertDialog.Backdrop className="backdrop" />
        <AlertDialog.Popup className="dlg">
          <AlertDialog.Title>{question}</AlertDialog.Title>
          <AlertDialog.Description className="mid" render={<div />}>
            {children}
          </AlertDialog.Description>
          <div className="dlg-act">
            <AlertDialog.Close
              disabled={pending}
              render={
                <Button variant="lo" keycap="Esc">
                  {safe}
                </Button>
              }
            />
            <Button variant="go" pending={pending} pendingText={pendingText} onClick={onAction}>
              {action}
            </Button>
          </div>
        </AlertDialog.Popup>
      </AlertDialog.Portal>
    </AlertDialog.Root>
  );
}

/** A small task over the page (a form, a choice). Closes on Esc and on its close key; a press outside does not close it, so nothing typed is lost. */
export function TaskDialog({
  trigger,
  open,
  onOpenChange,
  title,
  description,
  wide = false,
  children,
}: OpenState & { title: string; description?: ReactNode; wide?: boolean; children: ReactNode }) {
  return (
    <BaseDialog.Root open={open} onOpenChange={onOpenChange} disablePointerDismissal>
      {trigger === undefined ? null : <BaseDialog.Trigger render={trigger} />}
      <BaseDialog.Portal>
        <BaseDialog.Backdrop className="backdrop" />
        <BaseDialog.Popup className={clsx("dlg", wide && "wide")}>
          <BaseDialog.Title>{title}</BaseDialog.Title>
          {description === undefined ? null : (
            <BaseDialog.Description className="mid" render={<div />}>
              {description}
            </BaseDialog.Description>
          )}
          {children}
        </BaseDialog.Popup>
      </BaseDialog.Portal>
    </BaseDialog.Root>
  );
}

/** The safe key of a TaskDialog: closes it and hands the focus back. */
export const DialogClose = ({ children }: { children: string }) => (
  <BaseDialog.Close
    render={
      <Button variant="lo" keycap="Esc">
        {children}
      </Button>
    }
  />
);
