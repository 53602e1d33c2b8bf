export interface Round { times: number[]; perSecond: number }
export interface Summary { n: number; p50: number; p95: number; perSecond: number }
export interface Target { name: string; once: () => Promise<unknown> }
export function round(once: () => Promise<unknown>, how: { clients: number; ms: number }): Promise<Round>;
export function summary(rounds: readonly Round[]): Summary;
export function measure(targets: readonly Target[], how: { clients: number; rounds: number; ms: number; warmMs: number }, told?: (round: number) => void): Promise<Map<string, Summary>>;
