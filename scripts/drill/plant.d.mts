export function misplaced(): string[];
