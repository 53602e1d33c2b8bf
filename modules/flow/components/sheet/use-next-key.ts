"use client";
import { useEffect } from "react";

/** Ctrl+Enter does the one next step of the sheet: starts, finishes, issues. Nothing while a dialog is open. */
export function useNextKey(): void {
  useEffect(() => {
    const press = (e: KeyboardEvent) => {
      if (e.key !== "Enter" || !(e.ctrlKey || e.metaKey) || e.repeat || document.querySelector('[role="dialog"], [role="alertdialog"]')) return;
      const next = document.querySelector<HTMLButtonElement>(".flow-sheet .commit-bar button.go:not([disabled])");
      if (!next) return;
      e.preventDefault();
      next.focus();
      next.click();
    };
    window.addEventListener("keydown", press);
    return () => window.removeEventListener("keydown", press);
  }, []);
}

/** A sheet that was just begun takes the hand to its first cell, where there is a keyboard to type on. */
export function useFirstCell(cell: string | null): void {
  useEffect(() => {
    if (cell === null || !window.matchMedia("(hover: hover) and (pointer: fine)").matches) return;
    const timer = setTimeout(() => {
      const { activeElement } = document;
      if (activeElement === null || activeElement === document.body) document.getElementById(cell)?.focus();
    }, 60);
    return () => clearTimeout(timer);
  }, [cell]);
}
