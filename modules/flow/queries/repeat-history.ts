import "server-only";
import { sql } from "drizzle-orm";
import { inShop, type ShopContext } from "@/modules/access/context";
import { historySpan, joinedSpans, mayBeNewer, pooledHistory } from "../domain/bench-history";
import type { RawTest } from "../domain/raw-test";
import { standsInLibrary } from "../library-sql";

interface Pooled extends Record<string, unknown> { n: number; squares: number; dof: number }

/**
 * The same tests; those that may be the newer of a comparison carry the repeat history of their bench: the finished tests that
 * stand, at the same nominal pressure, of the twelve months up to them. A test's own repeats count once it is finished. Asked
 * only where verdicts are shown. No rights are asked here: callers do.
 *
 * What it costs: one statement. It reads the kept sums of tests with repeats by an index of just those, one bench and its months,
 * never a reading; a bench whose lifts are read once costs nothing but the statement.
 */
export async function withRepeatHistory<T extends RawTest>(ctx: ShopContext, tests: readonly T[]): Promise<T[]> {
  const asking = mayBeNewer(tests);
  if (asking.length === 0) return [...tests];
  const shop = ctx.shop.id;
  const asked = asking.map((t, n) => ({ n, bench_id: t.bench.id, at_inh2o: t.nominalInH2O, ...historySpan(t.startedAt) }));
  const spans = [...new Set(asked.map((a) => a.bench_id))].flatMap((bench) => joinedSpans(asked.filter((a) => a.bench_id === bench)).map(({ since, until }) =>
    sql`(s.bench_id = ${bench}::uuid and s.started_at > ${since}::timestamptz and s.started_at <= ${until}::timestamptz)`));
  const pooled = await inShop(ctx, (tx) => tx.execute<Pooled>(sql`
    with kept as materialized (
      select s.bench_id, s.at_inh2o, s.started_at, s.repeat_squares_cfm2, s.repeat_dof
      from flow_test_summaries s join flow_tests on flow_tests.shop_id = s.shop_id and flow_tests.id = s.test_id
      where s.shop_id = ${shop} and s.repeat_dof > 0 and (${sql.join(spans, sql` or `)}) and ${standsInLibrary(shop)})
    select a.n, coalesce(sum(k.repeat_squares_cfm2), 0)::float8 as squares, coalesce(sum(k.repeat_dof), 0)::int as dof
    from jsonb_to_recordset(${JSON.stringify(asked)}::jsonb) as a(n int, bench_id uuid, at_inh2o float8, since timestamptz, until timestamptz)
    left join kept k on k.bench_id = a.bench_id and k.at_inh2o = a.at_inh2o and k.started_at > a.since and k.started_at <= a.until
    group by a.n`));
  const histories = new Map(pooled.rows.flatMap((row) => { const test = asking[row.n]; return test ? [[test.id, pooledHistory({ squaresCfm2: row.squares, dof: row.dof })] as const] : []; }));
  return tests.map((t) => { const history = histories.get(t.id); return history ? { ...t, history } : t; });
}
