-- What must hold at any moment, in every shop. Each query returns the rows that break its rule: none is right.
-- Read by db/invariants.ts; run as a role that sees all shops, after a fault drill, a restore, or at any time.

-- I-1 every journal entry has two lines or more and sums to zero
select e.shop_id, e.id, e.number, coalesce(sum(l.amount_minor), 0) as rest, count(l.line_no) as lines
from journal_entries e left join journal_lines l on l.shop_id = e.shop_id and l.entry_id = e.id
group by e.shop_id, e.id, e.number having coalesce(sum(l.amount_minor), 0) <> 0 or count(l.line_no) < 2;

-- I-2 ledgers are insert-only: no working role may change or remove a row, and the triggers stand
select t.relname, t.what from (
  select c.relname, 'a working role may change rows' as what from pg_class c cross join (values ('vk_app'), ('vk_job')) as r(role)
  where c.relnamespace = 'public'::regnamespace and c.relname = any (array['audit_log','journal_entries','journal_lines','stock_movements','punches','approvals',
    'inspections','receiving_checks','bench_checks','flow_readings','command_log','shipments','receipts','receipt_lines','flow_comparisons','measurements','epoxy_fills','promises'])
    and (has_table_privilege(r.role, c.oid, 'update') or has_table_privilege(r.role, c.oid, 'delete') or has_table_privilege(r.role, c.oid, 'truncate'))
  union all
  select n.relname, 'no trigger ' || g.name from unnest(array['audit_log','journal_entries','journal_lines','stock_movements','punches','approvals',
    'inspections','receiving_checks','bench_checks','flow_readings','command_log','shipments','receipts','receipt_lines','flow_comparisons','measurements','epoxy_fills','promises']) as n(relname)
  cross join (values ('insert_only'), ('insert_only_truncate')) as g(name)
  where not exists (select 1 from pg_trigger p where p.tgrelid = ('public.' || n.relname)::regclass and p.tgname = g.name and p.tgenabled in ('O', 'A'))
) t;

-- I-3 an issued invoice is its lines, less discount, plus tax, and its receivable posting is its total
with issued as (
  select i.*, i.snapshot -> 'totals' as t from invoices i where i.state = 'issued'
), by_kind as (
  select i.shop_id, i.id, l.kind, sum(l.amount_minor) as amount from issued i join invoice_lines l on l.shop_id = i.shop_id and l.invoice_id = i.id group by 1, 2, 3
), posted as (
  select e.shop_id, e.source_id, sum(l.amount_minor) as amount from journal_entries e join journal_lines l on l.shop_id = e.shop_id and l.entry_id = e.id and l.account_code = '1100'
  where e.source_kind = 'invoice' and e.rule in ('invoiceIssued', 'creditNote') group by 1, 2
)
select i.shop_id, i.id, i.number, 'sums differ' as what from issued i
where i.t is null
   or (i.t ->> 'totalMinor')::bigint <> i.total_minor
   or (i.t ->> 'netMinor')::bigint + (i.t ->> 'taxMinor')::bigint <> i.total_minor
   or (i.t ->> 'laborMinor')::bigint + (i.t ->> 'partsMinor')::bigint + (i.t ->> 'suppliesMinor')::bigint + (i.t ->> 'freightMinor')::bigint
      + (i.t ->> 'outsideMinor')::bigint + (i.t ->> 'coreMinor')::bigint - (i.t ->> 'discountMinor')::bigint <> (i.t ->> 'netMinor')::bigint
   or (select coalesce(sum((g ->> 'taxMinor')::bigint), 0) from jsonb_array_elements(i.t -> 'groups') g) <> (i.t ->> 'taxMinor')::bigint
   -- Half-up on the absolute value, once a group; the line basis rounds elsewhere.
   or (i.t ->> 'taxBasis' = 'invoice' and exists (select 1 from jsonb_array_elements(i.t -> 'groups') g
        where round((g ->> 'baseMinor')::numeric * (g ->> 'percent')::numeric / 100) <> (g ->> 'taxMinor')::numeric))
union all
select i.shop_id, i.id, i.number, 'lines of kind ' || k.kind from issued i
cross join (values ('labor', 'laborMinor'), ('part', 'partsMinor'), ('freight', 'freightMinor'), ('outside', 'outsideMinor'), ('core', 'coreMinor')) as k(kind, name)
left join by_kind b on b.shop_id = i.shop_id and b.id = i.id and b.kind = k.kind
where coalesce(b.amount, 0) <> coalesce((i.t ->> k.name)::bigint, 0)
union all
select i.shop_id, i.id, i.number, 'receivable posted' from issued i left join posted p on p.shop_id = i.shop_id and p.source_id = i.id::text
where coalesce(p.amount, 0) <> i.total_minor;

-- I-4 what a customer owes by invoices is what the receivable says; deposits and credits held are never below zero
with owed as (
  select shop_id, customer_id, sum(total_minor - deposit_applied_minor - paid_minor - credited_minor) as amount
  from invoices where state = 'issued' and kind = 'invoice' group by 1, 2
), ledger as (
  select e.shop_id, e.customer_id, sum(l.amount_minor) filter (where l.account_code = '1100') as receivable, sum(l.amount_minor) filter (where l.account_code = '2110') as credits
  from journal_entries e join journal_lines l on l.shop_id = e.shop_id and l.entry_id = e.id where e.customer_id is not null group by 1, 2
)
select coalesce(o.shop_id, g.shop_id) as shop_id, coalesce(o.customer_id, g.customer_id) as customer_id, coalesce(o.amount, 0) as by_invoices, coalesce(g.receivable, 0) as by_ledger
from owed o full join ledger g on g.shop_id = o.shop_id and g.customer_id = o.customer_id
where coalesce(o.amount, 0) <> coalesce(g.receivable, 0) or coalesce(g.credits, 0) > 0
union all
select e.shop_id, e.work_order_id, 0, sum(l.amount_minor) from journal_entries e join journal_lines l on l.shop_id = e.shop_id and l.entry_id = e.id and l.account_code = '2100'
where e.work_order_id is not null group by 1, 2 having sum(l.amount_minor) > 0;

-- I-5 a provider's payment is booked once over all shops; no payment gives back more than it brought; a booked payout is its parts
select null::uuid as shop_id, provider_payment_id as about, count(*)::bigint as amount from payments where provider_payment_id is not null group by provider_payment_id having count(*) > 1
union all
select shop_id, receipt_number, refunded_minor from payments where refunded_minor > amount_minor or refunded_minor < 0
union all
select p.shop_id, p.provider_payout_id, p.amount_minor - coalesce(sum(i.net_minor), 0) from payouts p left join payout_items i on i.shop_id = p.shop_id and i.payout_id = p.id
where p.state = 'booked' group by p.shop_id, p.id, p.provider_payout_id, p.amount_minor having coalesce(sum(i.net_minor), 0) <> p.amount_minor
union all
select p.shop_id, p.receipt_number, p.amount_minor from payments p
where not exists (select 1 from journal_entries e where e.shop_id = p.shop_id and e.source_kind = 'payment' and e.source_id = p.id::text and e.rule in ('depositReceived', 'paymentReceived'));

-- I-6 the shelf is the sum of its movements, by part and by lot; what is promised is on the shelf and belongs to a need
with moved as (
  select shop_id, part_id, sum(qty_milli) as qty, sum(value_minor) as value from stock_movements group by 1, 2
), promised as (
  select shop_id, part_id, sum(reserved_milli) as qty from work_order_parts group by 1, 2
)
select coalesce(b.shop_id, m.shop_id) as shop_id, coalesce(b.part_id, m.part_id) as about, 'balance' as what
from stock_balances b full join moved m on m.shop_id = b.shop_id and m.part_id = b.part_id
where coalesce(b.on_hand_milli, 0) <> coalesce(m.qty, 0) or coalesce(b.value_minor, 0) <> coalesce(m.value, 0)
union all
select l.shop_id, l.id, 'lot' from lots l
where l.on_hand_milli <> (select coalesce(sum(m.qty_milli), 0) from stock_movements m where m.shop_id = l.shop_id and m.lot_id = l.id)
union all
select b.shop_id, b.part_id, 'lots of the part' from stock_balances b join parts p on p.shop_id = b.shop_id and p.id = b.part_id and p.lot_tracked
where b.on_hand_milli <> (select coalesce(sum(l.on_hand_milli), 0) from lots l where l.shop_id = b.shop_id and l.part_id = b.part_id)
union all
select coalesce(b.shop_id, r.shop_id), coalesce(b.part_id, r.part_id), 'promised' from stock_balances b full join promised r on r.shop_id = b.shop_id and r.part_id = b.part_id
where coalesce(b.reserved_milli, 0) <> coalesce(r.qty, 0) or coalesce(b.reserved_milli, 0) > coalesce(b.on_hand_milli, 0)
union all
select w.shop_id, w.id, 'issued to the order' from work_order_parts w
left join lateral (select coalesce(sum(-m.qty_milli), 0) as qty, coalesce(sum(-m.value_minor), 0) as value from stock_movements m where m.shop_id = w.shop_id and m.work_order_part_id = w.id) m on true
where w.issued_milli <> m.qty or w.issued_value_minor <> m.value;

-- I-7 the value on the shelf is the balance of the stock account
with shelf as (select shop_id, sum(value_minor) as value from stock_balances group by 1),
     books as (select shop_id, sum(amount_minor) as value from journal_lines where account_code = '1200' group by 1)
select coalesce(s.shop_id, b.shop_id) as shop_id, coalesce(s.value, 0) as shelf, coalesce(b.value, 0) as books
from shelf s full join books b on b.shop_id = s.shop_id where coalesce(s.value, 0) <> coalesce(b.value, 0);

-- I-8 nobody is in two places at once, no interval runs backwards, and each that a clock made has its punch
select a.shop_id, a.id, 'overlap' as what from time_entries a join time_entries b on b.shop_id = a.shop_id and b.person_id = a.person_id and b.clock = a.clock and b.id > a.id
where a.voided_at is null and b.voided_at is null and a.during && b.during
union all
select shop_id, id, 'backwards' from time_entries where ended_at < started_at
union all
select t.shop_id, t.id, 'no punch' from time_entries t where t.voided_at is null and t.source in ('tablet', 'offline', 'desk')
  and not exists (select 1 from punches p where p.shop_id = t.shop_id and p.person_id = t.person_id and p.at = t.started_at)
union all
select t.shop_id, t.id, 'work of another order' from time_entries t join operations o on o.shop_id = t.shop_id and o.id = t.operation_id
where t.work_order_id is distinct from o.work_order_id or t.piece_id is distinct from o.piece_id;

-- I-9 document numbers run without gap or repeat up to the next one of their series
with numbered as (
  select shop_id, regexp_replace(number, '-\d+$', '') as series, substring(number from '(\d+)$')::bigint as n from (
    select shop_id, number from work_orders union all select shop_id, number from invoices where number is not null
    union all select shop_id, receipt_number from payments union all select shop_id, number from purchase_orders where number is not null
  ) d
  union all select shop_id, 'JOURNAL', number from journal_entries
), runs as (
  select shop_id, series, min(n) as first, max(n) as last, count(*) as n, count(distinct n) as different from numbered group by 1, 2
)
select r.shop_id, r.series, r.first, r.last, r.n, c.next from runs r left join counters c on c.shop_id = r.shop_id and c.series = r.series
where r.n <> r.different or r.last - r.first + 1 <> r.n or c.next is distinct from r.last + 1;

-- I-10 an acknowledged command has exactly one effect: one answer kept, one row in the trail
select c.shop_id, c.request_id, c.command, 'rows in the trail' as what from command_log c
where (select count(*) from audit_log a where a.shop_id = c.shop_id and a.request_id = c.request_id and a.command = c.command) <> 1
union all
select a.shop_id, a.request_id, a.command, 'no answer kept' from audit_log a
where a.request_id is not null and not exists (select 1 from command_log c where c.shop_id = a.shop_id and c.request_id = a.request_id);

-- I-11 no job waits a quarter of an hour past its time: it is done, or parked with its reason
select shop_id, id, task, tries from jobs
where done_at is null and parked_at is null and run_at < now() - interval '15 minutes' and (lease_until is null or lease_until < now() - interval '15 minutes')
union all
select shop_id, id, task, tries from jobs where parked_at is not null and coalesce(last_error, '') = '';

-- I-12 the trail of a shop is one chain from 1 on, each row naming the hash of the one before
select shop_id, seq, command from (
  select shop_id, seq, command, prev_hash, lag(hash, 1, '') over w as before, lag(seq, 1, 0::bigint) over w as seq_before from audit_log window w as (partition by shop_id order by seq)
) t where prev_hash <> before or seq <> seq_before + 1;

-- I-13 each file row names bytes and their hash, and whatever names a file finds its row
select shop_id, id, 'row' as what from files where sha256 !~ '^[0-9a-f]{64}$' or size_bytes <= 0 or storage_key = ''
union all
select r.shop_id, r.id, r.what from (
  select shop_id, id, pdf_file_id as file_id, 'invoice' as what from invoices union all select shop_id, id, pdf_file_id, 'estimate' from estimates
  union all select shop_id, id, pdf_file_id, 'purchase order' from purchase_orders union all select shop_id, id, pdf_file_id, 'flow comparison' from flow_comparisons
  union all select shop_id, id, unnest(attachment_file_ids), 'mail' from mail_messages
) r where r.file_id is not null and not exists (select 1 from files f where f.shop_id = r.shop_id and f.id = r.file_id);

-- I-14 every constraint is checked and every index can be used
select conrelid::regclass::text as about, conname::text as name from pg_constraint where connamespace = 'public'::regnamespace and not convalidated
union all
select i.indrelid::regclass::text, c.relname::text from pg_index i join pg_class c on c.oid = i.indexrelid where c.relnamespace = 'public'::regnamespace and not (i.indisvalid and i.indisready);

-- I-15 what a row names without a foreign key is there, in its own shop
select t.* from (
  select p.shop_id, p.id, 'payment' as what from payments p where (p.invoice_id is not null and not exists (select 1 from invoices i where i.shop_id = p.shop_id and i.id = p.invoice_id))
    or (p.work_order_id is not null and not exists (select 1 from work_orders w where w.shop_id = p.shop_id and w.id = p.work_order_id))
  union all
  select r.shop_id, r.id, 'payment request' from payment_requests r where (r.invoice_id is not null and not exists (select 1 from invoices i where i.shop_id = r.shop_id and i.id = r.invoice_id))
    or (r.work_order_id is not null and not exists (select 1 from work_orders w where w.shop_id = r.shop_id and w.id = r.work_order_id))
  union all
  select l.shop_id, l.id, 'link' from links l where not exists (select 1 from customers c where c.shop_id = l.shop_id and c.id = l.customer_id)
    or (l.purpose = 'estimate' and not exists (select 1 from estimates e where e.shop_id = l.shop_id and e.id = l.subject_id))
    or (l.purpose = 'invoice' and not exists (select 1 from invoices i where i.shop_id = l.shop_id and i.id = l.subject_id))
  union all
  select m.shop_id, m.id, 'movement' from stock_movements m where (m.work_order_id is not null and not exists (select 1 from work_orders w where w.shop_id = m.shop_id and w.id = m.work_order_id))
    or (m.work_order_part_id is not null and not exists (select 1 from work_order_parts w where w.shop_id = m.shop_id and w.id = m.work_order_part_id))
    or (m.receipt_line_id is not null and not exists (select 1 from receipt_lines l where l.shop_id = m.shop_id and l.id = m.receipt_line_id))
    or (m.reverses_id is not null and not exists (select 1 from stock_movements o where o.shop_id = m.shop_id and o.id = m.reverses_id))
    or (m.person_id is not null and not exists (select 1 from people p where p.shop_id = m.shop_id and p.id = m.person_id))
  union all
  select e.shop_id, e.id, 'journal entry' from journal_entries e where (e.work_order_id is not null and not exists (select 1 from work_orders w where w.shop_id = e.shop_id and w.id = e.work_order_id))
    or (e.customer_id is not null and not exists (select 1 from customers c where c.shop_id = e.shop_id and c.id = e.customer_id))
  union all
  select w.shop_id, w.id, 'work order' from work_orders w where w.agreed_estimate_id is not null
    and not exists (select 1 from estimates e where e.shop_id = w.shop_id and e.id = w.agreed_estimate_id and e.work_order_id = w.id)
  union all
  select o.shop_id, o.id, 'operation' from operations o join pieces p on p.shop_id = o.shop_id and p.id = o.piece_id where p.work_order_id <> o.work_order_id
) t;

-- I-16 the version of a record counts its accepted edits
select r.shop_id, r.id, r.command, r.version from (
  select shop_id, id, version, 'customers.change' as command from customers union all select shop_id, id, version, 'menu.change' from menu_operations
  union all select shop_id, id, version, 'purchasing.changeSupplier' from suppliers
) r where r.version <> 1 + (select count(*) from audit_log a where a.shop_id = r.shop_id and a.command = r.command and a.subject_id = r.id::text);

-- I-17 no signed event of the payment provider waits a quarter of an hour: it is done, or set aside with its reason
select id, type, received_at from provider_events where done_at is null and parked_reason is null and received_at < now() - interval '15 minutes';

-- I-18 a business date is the shop's own day of its instant
select i.shop_id, i.id, i.number from invoices i join shops s on s.id = i.shop_id where i.state = 'issued' and i.issued_on is distinct from (i.issued_at at time zone s.zone)::date
union all
select w.shop_id, w.id, w.number from work_orders w join shops s on s.id = w.shop_id where substring(w.number from '^WO-(\d{4})-')::int <> extract(year from w.opened_at at time zone s.zone)::int
union all
select p.shop_id, p.id, p.receipt_number from payments p join shops s on s.id = p.shop_id where substring(p.receipt_number from '^RC-(\d{4})-')::int <> extract(year from p.received_at at time zone s.zone)::int
union all
select e.shop_id, e.id, e.number::text from journal_entries e join invoices i on i.shop_id = e.shop_id and i.id::text = e.source_id and e.source_kind = 'invoice' and e.rule in ('invoiceIssued', 'creditNote')
where e.date is distinct from i.issued_on;
