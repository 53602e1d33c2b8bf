export function setClock(file: string, instant: string | Date): void;
export function clearClock(file: string): void;
