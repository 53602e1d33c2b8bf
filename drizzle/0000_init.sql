CREATE TABLE "counters" (
	"shop_id" uuid NOT NULL,
	"series" text NOT NULL,
	"next" bigint DEFAULT 1 NOT NULL,
	CONSTRAINT "counters_shop_id_series_pk" PRIMARY KEY("shop_id","series")
);
--> statement-breakpoint
CREATE TABLE "devices" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"kind" text DEFAULT 'clock' NOT NULL,
	"enrol_code_hash" text,
	"enrol_code_expires_at" timestamp with time zone,
	"token_hash" text,
	"enrolled_by" uuid,
	"last_seen_at" timestamp with time zone,
	"revoked_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "devices_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "files" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"kind" text NOT NULL,
	"storage_key" text NOT NULL,
	"thumb_key" text,
	"name" text NOT NULL,
	"mime" text NOT NULL,
	"size_bytes" integer NOT NULL,
	"sha256" text NOT NULL,
	"subject_kind" text NOT NULL,
	"subject_id" uuid NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"uploaded_by" uuid,
	"at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "files_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "files_key" UNIQUE("shop_id","storage_key")
);
--> statement-breakpoint
CREATE TABLE "pay_rates" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"valid_from" date NOT NULL,
	"rate_minor" bigint NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "pay_rates_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "pay_rates_from" UNIQUE("shop_id","person_id","valid_from")
);
--> statement-breakpoint
CREATE TABLE "people" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"user_id" uuid,
	"name" text NOT NULL,
	"short_name" text NOT NULL,
	"email" text,
	"roles" text[] NOT NULL,
	"skills" text[] DEFAULT '{}'::text[] NOT NULL,
	"pay_class" text DEFAULT 'hourly' NOT NULL,
	"badge_code" text,
	"pin_hash" text,
	"pin_failed_tries" integer DEFAULT 0 NOT NULL,
	"pin_locked_until" timestamp with time zone,
	"left_at" timestamp with time zone,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "people_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" uuid PRIMARY KEY NOT NULL,
	"user_id" uuid NOT NULL,
	"user_agent" text DEFAULT '' NOT NULL,
	"last_seen_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "shop_settings" (
	"shop_id" uuid NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"phone" text DEFAULT '' NOT NULL,
	"email" text DEFAULT '' NOT NULL,
	"tax_number" text DEFAULT '' NOT NULL,
	"tax_mode" text DEFAULT 'sales' NOT NULL,
	"tax_name" text DEFAULT 'Sales tax' NOT NULL,
	"tax_rate_text" text DEFAULT '0' NOT NULL,
	"tax_basis" text DEFAULT 'invoice' NOT NULL,
	"labor_taxable" boolean DEFAULT false NOT NULL,
	"parts_taxable" boolean DEFAULT true NOT NULL,
	"supplies_taxable" boolean DEFAULT true NOT NULL,
	"freight_taxable" boolean DEFAULT false NOT NULL,
	"tax_decided_by" text DEFAULT '' NOT NULL,
	"supplies_basis_points" integer DEFAULT 0 NOT NULL,
	"supplies_cap_minor" bigint,
	"deposit_basis_points" integer DEFAULT 0 NOT NULL,
	"burden_basis_points" integer DEFAULT 0 NOT NULL,
	"bill_rate_minor" bigint DEFAULT 0 NOT NULL,
	"estimate_valid_days" integer DEFAULT 30 NOT NULL,
	"bench_check_hours" integer DEFAULT 8 NOT NULL,
	"nominal_pressure_inh2o" integer DEFAULT 28 NOT NULL,
	"show_flow_estimates" boolean DEFAULT false NOT NULL,
	"flow_limits" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"write_off_limit_minor" bigint DEFAULT 100 NOT NULL,
	"workweek_start_day" integer DEFAULT 1 NOT NULL,
	"invoice_words" text DEFAULT '' NOT NULL,
	"reference_prefix" text DEFAULT 'VK' NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	CONSTRAINT "shop_settings_shop_id_pk" PRIMARY KEY("shop_id")
);
--> statement-breakpoint
CREATE TABLE "shops" (
	"id" uuid PRIMARY KEY NOT NULL,
	"slug" text NOT NULL,
	"name" text NOT NULL,
	"zone" text NOT NULL,
	"currency" text NOT NULL,
	"locale" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "shops_slug_unique" UNIQUE("slug")
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"failed_tries" integer DEFAULT 0 NOT NULL,
	"locked_until" timestamp with time zone,
	"disabled_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "users_email_unique" UNIQUE("email")
);
--> statement-breakpoint
CREATE TABLE "applied_steps" (
	"name" text PRIMARY KEY NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "applied_steps_name_unique" UNIQUE("name")
);
--> statement-breakpoint
CREATE TABLE "audit_log" (
	"shop_id" uuid NOT NULL,
	"seq" bigint NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"actor" text NOT NULL,
	"actor_name" text NOT NULL,
	"command" text NOT NULL,
	"request_id" uuid,
	"subject_kind" text,
	"subject_id" text,
	"note" text DEFAULT '' NOT NULL,
	"detail" jsonb NOT NULL,
	"prev_hash" text NOT NULL,
	"hash" text NOT NULL,
	CONSTRAINT "audit_log_shop_id_seq_pk" PRIMARY KEY("shop_id","seq")
);
--> statement-breakpoint
CREATE TABLE "command_log" (
	"shop_id" uuid NOT NULL,
	"request_id" uuid NOT NULL,
	"command" text NOT NULL,
	"actor" text NOT NULL,
	"input_hash" text NOT NULL,
	"reply" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "command_log_shop_id_request_id_pk" PRIMARY KEY("shop_id","request_id")
);
--> statement-breakpoint
CREATE TABLE "jobs" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"task" text NOT NULL,
	"payload" jsonb NOT NULL,
	"dedupe_key" text,
	"run_at" timestamp with time zone DEFAULT now() NOT NULL,
	"lease_until" timestamp with time zone,
	"tries" integer DEFAULT 0 NOT NULL,
	"last_error" text,
	"done_at" timestamp with time zone,
	"parked_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "jobs_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "links" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"token_hash" text NOT NULL,
	"purpose" text NOT NULL,
	"customer_id" uuid NOT NULL,
	"work_order_id" uuid,
	"subject_id" uuid NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	"first_opened_at" timestamp with time zone,
	"last_opened_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "links_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "links_token_hash_unique" UNIQUE("token_hash")
);
--> statement-breakpoint
CREATE TABLE "mail_messages" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"kind" text NOT NULL,
	"to_address" text NOT NULL,
	"to_name" text DEFAULT '' NOT NULL,
	"subject" text NOT NULL,
	"body_text" text NOT NULL,
	"body_html" text NOT NULL,
	"attachment_file_ids" uuid[] DEFAULT '{}'::uuid[] NOT NULL,
	"work_order_id" uuid,
	"subject_kind" text,
	"subject_id" uuid,
	"state" text DEFAULT 'queued' NOT NULL,
	"error" text,
	"sent_at" timestamp with time zone,
	"queued_by" text DEFAULT '' NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "mail_messages_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "provider_events" (
	"id" text PRIMARY KEY NOT NULL,
	"type" text NOT NULL,
	"body" jsonb NOT NULL,
	"shop_ref" uuid,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	"times_seen" integer DEFAULT 1 NOT NULL,
	"done_at" timestamp with time zone,
	"parked_reason" text
);
--> statement-breakpoint
CREATE TABLE "rate_limits" (
	"key" text NOT NULL,
	"window_start" timestamp with time zone NOT NULL,
	"hits" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "rate_limits_key_window_start_pk" PRIMARY KEY("key","window_start")
);
--> statement-breakpoint
CREATE TABLE "customers" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"kind" text DEFAULT 'person' NOT NULL,
	"name" text NOT NULL,
	"name_key" text NOT NULL,
	"email" text,
	"phone" text,
	"phone_digits" text DEFAULT '' NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"terms" text DEFAULT 'receipt' NOT NULL,
	"labor_discount_basis_points" integer DEFAULT 0 NOT NULL,
	"credit_limit_minor" bigint,
	"tax_number" text DEFAULT '' NOT NULL,
	"notes" text DEFAULT '' NOT NULL,
	"mail_problem" text,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "customers_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "tax_certificates" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"customer_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"number" text NOT NULL,
	"jurisdiction" text NOT NULL,
	"valid_from" date NOT NULL,
	"valid_to" date NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "tax_certificates_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "kit_lines" (
	"shop_id" uuid NOT NULL,
	"kit_part_id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"qty_milli" bigint NOT NULL,
	CONSTRAINT "kit_lines_shop_id_kit_part_id_part_id_pk" PRIMARY KEY("shop_id","kit_part_id","part_id")
);
--> statement-breakpoint
CREATE TABLE "lots" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"code" text NOT NULL,
	"expires_on" date,
	"on_hand_milli" bigint DEFAULT 0 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "lots_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "lots_code" UNIQUE("shop_id","part_id","code"),
	CONSTRAINT "lot_not_below_zero" CHECK (on_hand_milli >= 0)
);
--> statement-breakpoint
CREATE TABLE "parts" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"sku" text NOT NULL,
	"description" text NOT NULL,
	"description_key" text NOT NULL,
	"part_class" text NOT NULL,
	"families" text[] DEFAULT '{}'::text[] NOT NULL,
	"position" text DEFAULT '' NOT NULL,
	"stock_unit" text DEFAULT 'each' NOT NULL,
	"bin" text DEFAULT '' NOT NULL,
	"sale_price_minor" bigint NOT NULL,
	"is_kit" boolean DEFAULT false NOT NULL,
	"lot_tracked" boolean DEFAULT false NOT NULL,
	"reorder_point_milli" bigint,
	"order_qty_milli" bigint,
	"preferred_supplier_id" uuid,
	"supplier_number" text DEFAULT '' NOT NULL,
	"last_price_minor" bigint,
	"material_note" text DEFAULT '' NOT NULL,
	"hazard" text DEFAULT '' NOT NULL,
	"active" boolean DEFAULT true NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "parts_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "parts_sku" UNIQUE("shop_id","sku")
);
--> statement-breakpoint
CREATE TABLE "stock_balances" (
	"shop_id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"on_hand_milli" bigint DEFAULT 0 NOT NULL,
	"value_minor" bigint DEFAULT 0 NOT NULL,
	"reserved_milli" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "stock_balances_shop_id_part_id_pk" PRIMARY KEY("shop_id","part_id"),
	CONSTRAINT "stock_not_below_zero" CHECK (on_hand_milli >= 0),
	CONSTRAINT "stock_value_not_below_zero" CHECK (value_minor >= 0),
	CONSTRAINT "reserved_not_below_zero" CHECK (reserved_milli >= 0)
);
--> statement-breakpoint
CREATE TABLE "stock_movements" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"seq" bigint GENERATED ALWAYS AS IDENTITY (sequence name "stock_movements_seq_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"part_id" uuid NOT NULL,
	"lot_id" uuid,
	"qty_milli" bigint NOT NULL,
	"value_minor" bigint NOT NULL,
	"kind" text NOT NULL,
	"work_order_id" uuid,
	"work_order_part_id" uuid,
	"receipt_line_id" uuid,
	"reverses_id" uuid,
	"reason" text DEFAULT '' NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"person_id" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "stock_movements_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "suppliers" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"email" text DEFAULT '' NOT NULL,
	"phone" text DEFAULT '' NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"terms" text DEFAULT 'net_30' NOT NULL,
	"lead_days" integer,
	"active" boolean DEFAULT true NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "suppliers_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "suppliers_name" UNIQUE("shop_id","name")
);
--> statement-breakpoint
CREATE TABLE "purchase_order_lines" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"purchase_order_id" uuid NOT NULL,
	"line_no" integer NOT NULL,
	"part_id" uuid NOT NULL,
	"supplier_number" text DEFAULT '' NOT NULL,
	"qty_milli" bigint NOT NULL,
	"unit_price_minor" bigint NOT NULL,
	"received_milli" bigint DEFAULT 0 NOT NULL,
	"work_order_id" uuid,
	CONSTRAINT "purchase_order_lines_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "purchase_order_lines_no" UNIQUE("shop_id","purchase_order_id","line_no")
);
--> statement-breakpoint
CREATE TABLE "purchase_orders" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"number" text,
	"supplier_id" uuid NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"needed_by" date,
	"expected_on" date,
	"notes" text DEFAULT '' NOT NULL,
	"ordered_at" timestamp with time zone,
	"ordered_by" uuid,
	"pdf_file_id" uuid,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "purchase_orders_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "purchase_orders_number" UNIQUE("shop_id","number")
);
--> statement-breakpoint
CREATE TABLE "receipt_lines" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"receipt_id" uuid NOT NULL,
	"purchase_order_line_id" uuid NOT NULL,
	"qty_milli" bigint NOT NULL,
	"price_value_minor" bigint NOT NULL,
	"freight_share_minor" bigint NOT NULL,
	"lot_code" text,
	"expires_on" date,
	CONSTRAINT "receipt_lines_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "receipts" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"number" text NOT NULL,
	"purchase_order_id" uuid NOT NULL,
	"received_at" timestamp with time zone NOT NULL,
	"freight_minor" bigint NOT NULL,
	"delivery_note" text DEFAULT '' NOT NULL,
	"person_id" uuid,
	CONSTRAINT "receipts_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "receipts_number" UNIQUE("shop_id","number")
);
--> statement-breakpoint
CREATE TABLE "approvals" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"estimate_id" uuid NOT NULL,
	"answer" text NOT NULL,
	"via" text NOT NULL,
	"name" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"ip" text DEFAULT '' NOT NULL,
	"agent" text DEFAULT '' NOT NULL,
	"phone_number" text DEFAULT '' NOT NULL,
	"taken_by" uuid,
	"document_hash" text NOT NULL,
	"words" text NOT NULL,
	"total_minor" bigint NOT NULL,
	CONSTRAINT "approvals_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "approvals_one_answer" UNIQUE("shop_id","estimate_id")
);
--> statement-breakpoint
CREATE TABLE "cautions_seen" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"work_order_id" uuid NOT NULL,
	"hazard" text NOT NULL,
	"step" text NOT NULL,
	"person_id" uuid NOT NULL,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "cautions_seen_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "cautions_once" UNIQUE("shop_id","work_order_id","hazard","step","person_id")
);
--> statement-breakpoint
CREATE TABLE "epoxy_fills" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"piece_id" uuid NOT NULL,
	"operation_id" uuid NOT NULL,
	"port" text NOT NULL,
	"grams_in_port_milli" bigint NOT NULL,
	"grams_waste_milli" bigint NOT NULL,
	"ratio_text" text NOT NULL,
	"surface_prepared" boolean NOT NULL,
	"mixed_at" timestamp with time zone NOT NULL,
	"cure_minutes" integer NOT NULL,
	"ready_at" timestamp with time zone NOT NULL,
	"person_id" uuid,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "epoxy_fills_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "estimate_lines" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"estimate_id" uuid NOT NULL,
	"line_no" integer NOT NULL,
	"kind" text NOT NULL,
	"piece_id" uuid,
	"operation_code" text,
	"part_id" uuid,
	"description" text NOT NULL,
	"qty_milli" bigint NOT NULL,
	"unit_price_minor" bigint NOT NULL,
	"amount_minor" bigint NOT NULL,
	"book_minutes" integer DEFAULT 0 NOT NULL,
	"finding_id" uuid,
	CONSTRAINT "estimate_lines_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "estimate_lines_no" UNIQUE("shop_id","estimate_id","line_no")
);
--> statement-breakpoint
CREATE TABLE "estimates" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"work_order_id" uuid NOT NULL,
	"estimate_no" integer NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"valid_until" date,
	"sent_at" timestamp with time zone,
	"sent_to" text,
	"opened_at" timestamp with time zone,
	"labor_discount_basis_points" integer DEFAULT 0 NOT NULL,
	"freight_minor" bigint DEFAULT 0 NOT NULL,
	"exclusions" text DEFAULT '' NOT NULL,
	"message" text DEFAULT '' NOT NULL,
	"estimated_ready_on" date,
	"deposit_basis_points" integer DEFAULT 0 NOT NULL,
	"snapshot" jsonb,
	"document_hash" text,
	"pdf_file_id" uuid,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "estimates_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "estimates_number" UNIQUE("shop_id","work_order_id","estimate_no")
);
--> statement-breakpoint
CREATE TABLE "findings" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"piece_id" uuid NOT NULL,
	"work_order_id" uuid NOT NULL,
	"words" text NOT NULL,
	"position" text DEFAULT '' NOT NULL,
	"found_at" timestamp with time zone NOT NULL,
	"found_by" uuid,
	"go_on_meanwhile" boolean DEFAULT true NOT NULL,
	"estimate_id" uuid,
	"withdrawn_at" timestamp with time zone,
	"version" bigint DEFAULT 1 NOT NULL,
	CONSTRAINT "findings_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "holds" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"piece_id" uuid NOT NULL,
	"reason" text NOT NULL,
	"words" text DEFAULT '' NOT NULL,
	"since" timestamp with time zone NOT NULL,
	"set_by" uuid,
	"ended_at" timestamp with time zone,
	"ended_by" uuid,
	CONSTRAINT "holds_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "inspections" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"piece_id" uuid NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"person_id" uuid NOT NULL,
	"checklist" jsonb NOT NULL,
	"outcome" text NOT NULL,
	"reason" text DEFAULT '' NOT NULL,
	"alone" boolean DEFAULT false NOT NULL,
	CONSTRAINT "inspections_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "menu_operations" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"customer_words" text DEFAULT '' NOT NULL,
	"station" text NOT NULL,
	"skill" text NOT NULL,
	"sequence" integer NOT NULL,
	"book_minutes" integer NOT NULL,
	"price_minor" bigint NOT NULL,
	"billing" text DEFAULT 'fixed' NOT NULL,
	"needs_before" text[] DEFAULT '{}'::text[] NOT NULL,
	"must_record" text DEFAULT '' NOT NULL,
	"hazards" text[] DEFAULT '{}'::text[] NOT NULL,
	"active" boolean DEFAULT true NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "menu_operations_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "menu_operations_code" UNIQUE("shop_id","code")
);
--> statement-breakpoint
CREATE TABLE "operations" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"work_order_id" uuid NOT NULL,
	"piece_id" uuid NOT NULL,
	"sequence" integer NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"station" text NOT NULL,
	"skill" text NOT NULL,
	"qty_milli" bigint NOT NULL,
	"book_minutes" integer NOT NULL,
	"price_minor" bigint NOT NULL,
	"estimate_line_id" uuid,
	"needs_before" text[] DEFAULT '{}'::text[] NOT NULL,
	"hazards" text[] DEFAULT '{}'::text[] NOT NULL,
	"bench_note" text DEFAULT '' NOT NULL,
	"started_at" timestamp with time zone,
	"done_at" timestamp with time zone,
	"done_by" uuid,
	"not_before" timestamp with time zone,
	"not_before_reason" text,
	"skipped_at" timestamp with time zone,
	"skip_reason" text,
	"removed_at" timestamp with time zone,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "operations_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "promises" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"work_order_id" uuid NOT NULL,
	"promised_on" date NOT NULL,
	"reason" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"person_id" uuid,
	CONSTRAINT "promises_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "receiving_checks" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"piece_id" uuid NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"person_id" uuid,
	"parcel_condition" text NOT NULL,
	"counts" jsonb NOT NULL,
	"missing" text DEFAULT '' NOT NULL,
	"damage" text DEFAULT '' NOT NULL,
	"notes" text DEFAULT '' NOT NULL,
	CONSTRAINT "receiving_checks_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "shipments" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"work_order_id" uuid NOT NULL,
	"carrier" text NOT NULL,
	"service" text DEFAULT '' NOT NULL,
	"tracking" text DEFAULT '' NOT NULL,
	"insured_minor" bigint,
	"cost_minor" bigint NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"person_id" uuid,
	CONSTRAINT "shipments_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "work_order_parts" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"work_order_id" uuid NOT NULL,
	"piece_id" uuid,
	"part_id" uuid NOT NULL,
	"needed_milli" bigint NOT NULL,
	"reserved_milli" bigint DEFAULT 0 NOT NULL,
	"issued_milli" bigint DEFAULT 0 NOT NULL,
	"issued_value_minor" bigint DEFAULT 0 NOT NULL,
	"estimate_line_id" uuid,
	"removed_at" timestamp with time zone,
	"version" bigint DEFAULT 1 NOT NULL,
	CONSTRAINT "work_order_parts_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "work_orders" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"number" text NOT NULL,
	"customer_id" uuid NOT NULL,
	"customer_reference" text DEFAULT '' NOT NULL,
	"wants" text DEFAULT '' NOT NULL,
	"use" text DEFAULT 'road' NOT NULL,
	"promised_on" date,
	"labor_discount_basis_points" integer DEFAULT 0 NOT NULL,
	"opened_at" timestamp with time zone NOT NULL,
	"opened_by" uuid,
	"agreed_estimate_id" uuid,
	"closed_at" timestamp with time zone,
	"cancelled_at" timestamp with time zone,
	"cancel_reason" text,
	"notes" text DEFAULT '' NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "work_orders_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "work_orders_number" UNIQUE("shop_id","number")
);
--> statement-breakpoint
CREATE TABLE "pieces" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"work_order_id" uuid NOT NULL,
	"piece_no" integer NOT NULL,
	"tag" text,
	"owner_kind" text DEFAULT 'customer' NOT NULL,
	"family" text NOT NULL,
	"description" text DEFAULT '' NOT NULL,
	"casting_number" text DEFAULT '' NOT NULL,
	"serial" text DEFAULT '' NOT NULL,
	"declared_value_minor" bigint,
	"seat_material" text DEFAULT 'unknown' NOT NULL,
	"place" text DEFAULT '' NOT NULL,
	"booked_in_at" timestamp with time zone,
	"released_at" timestamp with time zone,
	"released_by" uuid,
	"handed_over_at" timestamp with time zone,
	"handed_over_to" text,
	"stopped_at" timestamp with time zone,
	"stop_reason" text,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "pieces_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "pieces_number" UNIQUE("shop_id","work_order_id","piece_no")
);
--> statement-breakpoint
CREATE TABLE "correction_requests" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"time_entry_id" uuid,
	"clock" text NOT NULL,
	"operation_id" uuid,
	"indirect_code" text,
	"started_at" timestamp with time zone NOT NULL,
	"ended_at" timestamp with time zone NOT NULL,
	"reason" text NOT NULL,
	"asked_at" timestamp with time zone NOT NULL,
	"answer" text,
	"answered_by" uuid,
	"answered_at" timestamp with time zone,
	CONSTRAINT "correction_requests_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "punches" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"seq" bigint GENERATED ALWAYS AS IDENTITY (sequence name "punches_seq_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"person_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"device_at" timestamp with time zone,
	"received_at" timestamp with time zone NOT NULL,
	"source" text NOT NULL,
	"device_id" uuid,
	"operation_id" uuid,
	"indirect_code" text,
	"flag" text,
	"note" text DEFAULT '' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "punches_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "time_entries" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"clock" text NOT NULL,
	"operation_id" uuid,
	"work_order_id" uuid,
	"piece_id" uuid,
	"indirect_code" text,
	"started_at" timestamp with time zone NOT NULL,
	"ended_at" timestamp with time zone,
	"during" "tstzrange" GENERATED ALWAYS AS (tstzrange(started_at, ended_at, '[)')) STORED,
	"source" text NOT NULL,
	"rework" boolean DEFAULT false NOT NULL,
	"replaced_by_id" uuid,
	"voided_at" timestamp with time zone,
	"reason" text DEFAULT '' NOT NULL,
	"entered_by" uuid,
	"accepted_by" uuid,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "time_entries_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "bench_checks" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"bench_id" uuid NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"person_id" uuid,
	"plate_readings" jsonb NOT NULL,
	"factor" double precision NOT NULL,
	"max_residual_percent" double precision NOT NULL,
	"drift_percent" double precision,
	"flags" text[] DEFAULT '{}'::text[] NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"reason" text,
	"strikes" uuid,
	CONSTRAINT "bench_checks_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "benches" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"kind" text DEFAULT 'series_orifice' NOT NULL,
	"scale" text DEFAULT 'direct' NOT NULL,
	"ranges" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"water_unit" text DEFAULT 'conventional' NOT NULL,
	"nominal_pressures_inh2o" double precision[] DEFAULT '{28}'::float8[] NOT NULL,
	"max_flow_cfm" double precision DEFAULT 600 NOT NULL,
	"pressure_uncertainty_inh2o" double precision,
	"reading_uncertainty_cfm" double precision,
	"altitude_m" double precision,
	"active" boolean DEFAULT true NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "benches_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "benches_name" UNIQUE("shop_id","name")
);
--> statement-breakpoint
CREATE TABLE "camshafts" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"label" text NOT NULL,
	"side" text NOT NULL,
	"max_lift_um" integer NOT NULL,
	"duration_deg" double precision,
	"profile" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"data_source" text DEFAULT '' NOT NULL,
	"active" boolean DEFAULT true NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "camshafts_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "camshafts_label" UNIQUE("shop_id","label","side")
);
--> statement-breakpoint
CREATE TABLE "check_plates" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"serial" text NOT NULL,
	"reference_flow_cfm" double precision NOT NULL,
	"at_pressure_inh2o" double precision NOT NULL,
	"certificate" text DEFAULT '' NOT NULL,
	"due_on" date,
	"active" boolean DEFAULT true NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "check_plates_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "check_plates_serial" UNIQUE("shop_id","serial")
);
--> statement-breakpoint
CREATE TABLE "engine_families" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"cylinders" integer DEFAULT 1 NOT NULL,
	"bore_mm" double precision,
	"stroke_mm" double precision,
	"valves" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"cam_lift_intake_um" integer,
	"cam_lift_exhaust_um" integer,
	"notes" text DEFAULT '' NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "engine_families_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "engine_families_name" UNIQUE("shop_id","name")
);
--> statement-breakpoint
CREATE TABLE "fixtures" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"bore_mm" double precision NOT NULL,
	"length_mm" double precision,
	"head_pattern" text DEFAULT '' NOT NULL,
	"plate" text DEFAULT '' NOT NULL,
	"active" boolean DEFAULT true NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "fixtures_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "fixtures_name" UNIQUE("shop_id","name")
);
--> statement-breakpoint
CREATE TABLE "flow_comparisons" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"head_id" uuid NOT NULL,
	"cylinder" integer DEFAULT 1 NOT NULL,
	"comparison_no" integer NOT NULL,
	"before_test_ids" uuid[] NOT NULL,
	"after_test_ids" uuid[] NOT NULL,
	"snapshot" jsonb NOT NULL,
	"customer_words" text DEFAULT '' NOT NULL,
	"issued_at" timestamp with time zone NOT NULL,
	"issued_by" uuid NOT NULL,
	"pdf_file_id" uuid,
	CONSTRAINT "flow_comparisons_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "flow_comparisons_no" UNIQUE("shop_id","head_id","cylinder","comparison_no")
);
--> statement-breakpoint
CREATE TABLE "flow_readings" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"test_id" uuid NOT NULL,
	"lift_um" integer NOT NULL,
	"lift_text" text NOT NULL,
	"lift_unit" text NOT NULL,
	"repeat_no" integer DEFAULT 1 NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"value_text" text NOT NULL,
	"value_unit" text DEFAULT 'cfm' NOT NULL,
	"range_label" text,
	"pressure_text" text NOT NULL,
	"pressure_unit" text DEFAULT 'inH2O' NOT NULL,
	"port_temperature_text" text,
	"orifice_temperature_text" text,
	"accepted_reason" text,
	"excluded_reason" text,
	"cleared_at" timestamp with time zone,
	"taken_at" timestamp with time zone NOT NULL,
	"person_id" uuid,
	"source" text DEFAULT 'typed' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "flow_readings_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "flow_readings_cell" UNIQUE("shop_id","test_id","lift_um","repeat_no","revision")
);
--> statement-breakpoint
CREATE TABLE "flow_test_summaries" (
	"shop_id" uuid NOT NULL,
	"test_id" uuid NOT NULL,
	"head_id" uuid NOT NULL,
	"bench_id" uuid NOT NULL,
	"family" text NOT NULL,
	"side" text NOT NULL,
	"purpose" text NOT NULL,
	"started_at" timestamp with time zone NOT NULL,
	"at_inh2o" double precision NOT NULL,
	"lifts_um" integer[] NOT NULL,
	"flows_cfm" double precision[] NOT NULL,
	"peak_cfm" double precision,
	"peak_lift_um" integer,
	"mean_to_cam_cfm" double precision,
	"doubts" integer DEFAULT 0 NOT NULL,
	"is_converted" boolean DEFAULT false NOT NULL,
	"repeat_squares_cfm2" double precision DEFAULT 0 NOT NULL,
	"repeat_dof" integer DEFAULT 0 NOT NULL,
	"constants_version" integer NOT NULL,
	"made_at" timestamp with time zone NOT NULL,
	CONSTRAINT "flow_test_summaries_shop_id_test_id_pk" PRIMARY KEY("shop_id","test_id")
);
--> statement-breakpoint
CREATE TABLE "flow_tests" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"head_id" uuid NOT NULL,
	"cylinder" integer DEFAULT 1 NOT NULL,
	"side" text NOT NULL,
	"purpose" text NOT NULL,
	"run_no" integer DEFAULT 1 NOT NULL,
	"bench_id" uuid NOT NULL,
	"bench_factor" double precision DEFAULT 1 NOT NULL,
	"bench_checked_at" timestamp with time zone,
	"fixture_id" uuid NOT NULL,
	"lift_device_id" uuid,
	"camshaft_id" uuid,
	"cam_lift_um" integer,
	"nominal_pressure_inh2o" double precision NOT NULL,
	"lifts" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"lift_unit" text DEFAULT 'in' NOT NULL,
	"entry" text DEFAULT 'radius' NOT NULL,
	"valves_open" text DEFAULT 'all' NOT NULL,
	"valve_mm" double precision,
	"seat_note" text DEFAULT '' NOT NULL,
	"plug_closed" boolean DEFAULT true NOT NULL,
	"test_springs" boolean DEFAULT true NOT NULL,
	"warm_up_minutes" integer,
	"room_temperature_text" text DEFAULT '' NOT NULL,
	"room_pressure_text" text DEFAULT '' NOT NULL,
	"room_humidity_text" text DEFAULT '' NOT NULL,
	"leak_text" text DEFAULT '' NOT NULL,
	"leak_pressure_text" text DEFAULT '' NOT NULL,
	"leak_scaling_agreed" boolean DEFAULT false NOT NULL,
	"zero_return_um" integer,
	"notes" text DEFAULT '' NOT NULL,
	"operator_id" uuid NOT NULL,
	"started_at" timestamp with time zone NOT NULL,
	"completed_at" timestamp with time zone,
	"state" text DEFAULT 'draft' NOT NULL,
	"void_reason" text,
	"corrects_test_id" uuid,
	"imported_from" text,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "flow_tests_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "heads" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"piece_id" uuid,
	"owner_kind" text DEFAULT 'customer' NOT NULL,
	"mark" text NOT NULL,
	"family" text NOT NULL,
	"casting_number" text DEFAULT '' NOT NULL,
	"cylinders" integer DEFAULT 1 NOT NULL,
	"bore_mm" double precision,
	"stroke_mm" double precision,
	"seat_material" text DEFAULT 'unknown' NOT NULL,
	"cam_lift_intake_um" integer,
	"cam_lift_exhaust_um" integer,
	"work_done" text[] DEFAULT '{}'::text[] NOT NULL,
	"notes" text DEFAULT '' NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "heads_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "lift_devices" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"resolution_mm" double precision NOT NULL,
	"uncertainty_mm" double precision,
	"active" boolean DEFAULT true NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "lift_devices_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "lift_devices_name" UNIQUE("shop_id","name")
);
--> statement-breakpoint
CREATE TABLE "measurement_limits" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"family" text NOT NULL,
	"kind" text NOT NULL,
	"side" text DEFAULT '' NOT NULL,
	"min_text" text,
	"max_text" text,
	"unit" text NOT NULL,
	"source_text" text NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL,
	CONSTRAINT "measurement_limits_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "measurement_limits_kind" UNIQUE("shop_id","family","kind","side")
);
--> statement-breakpoint
CREATE TABLE "measurements" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"head_id" uuid NOT NULL,
	"cylinder" integer DEFAULT 1 NOT NULL,
	"side" text DEFAULT '' NOT NULL,
	"position" text DEFAULT '' NOT NULL,
	"kind" text NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"value_text" text NOT NULL,
	"unit" text NOT NULL,
	"value_si" double precision NOT NULL,
	"stage" text DEFAULT 'before' NOT NULL,
	"instrument" text DEFAULT '' NOT NULL,
	"person_id" uuid,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "measurements_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "measurements_cell" UNIQUE("shop_id","head_id","cylinder","side","position","kind","stage","revision")
);
--> statement-breakpoint
CREATE TABLE "accounts" (
	"shop_id" uuid NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"kind" text NOT NULL,
	"active" boolean DEFAULT true NOT NULL,
	CONSTRAINT "accounts_shop_id_code_pk" PRIMARY KEY("shop_id","code")
);
--> statement-breakpoint
CREATE TABLE "journal_entries" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"number" bigint NOT NULL,
	"date" date NOT NULL,
	"text" text NOT NULL,
	"rule" text NOT NULL,
	"source_kind" text NOT NULL,
	"source_id" text NOT NULL,
	"work_order_id" uuid,
	"customer_id" uuid,
	"reversal_of" uuid,
	"at" timestamp with time zone NOT NULL,
	"person_id" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "journal_entries_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "journal_entries_number" UNIQUE("shop_id","number"),
	CONSTRAINT "journal_entries_once" UNIQUE("shop_id","rule","source_kind","source_id")
);
--> statement-breakpoint
CREATE TABLE "journal_lines" (
	"shop_id" uuid NOT NULL,
	"entry_id" uuid NOT NULL,
	"line_no" integer NOT NULL,
	"account_code" text NOT NULL,
	"amount_minor" bigint NOT NULL,
	CONSTRAINT "journal_lines_shop_id_entry_id_line_no_pk" PRIMARY KEY("shop_id","entry_id","line_no"),
	CONSTRAINT "journal_line_not_zero" CHECK (amount_minor <> 0)
);
--> statement-breakpoint
CREATE TABLE "periods" (
	"shop_id" uuid NOT NULL,
	"month" text NOT NULL,
	"closed_at" timestamp with time zone,
	"closed_by" uuid,
	CONSTRAINT "periods_shop_id_month_pk" PRIMARY KEY("shop_id","month")
);
--> statement-breakpoint
CREATE TABLE "invoice_lines" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"invoice_id" uuid NOT NULL,
	"line_no" integer NOT NULL,
	"kind" text NOT NULL,
	"piece_tag" text DEFAULT '' NOT NULL,
	"description" text NOT NULL,
	"qty_milli" bigint NOT NULL,
	"unit" text DEFAULT '' NOT NULL,
	"unit_price_minor" bigint NOT NULL,
	"amount_minor" bigint NOT NULL,
	"book_minutes" integer DEFAULT 0 NOT NULL,
	"actual_minutes" integer DEFAULT 0 NOT NULL,
	"taxable" boolean DEFAULT false NOT NULL,
	"source_kind" text DEFAULT '' NOT NULL,
	"source_id" uuid,
	CONSTRAINT "invoice_lines_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "invoice_lines_no" UNIQUE("shop_id","invoice_id","line_no")
);
--> statement-breakpoint
CREATE TABLE "invoices" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"number" text,
	"kind" text DEFAULT 'invoice' NOT NULL,
	"work_order_id" uuid,
	"customer_id" uuid NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"issued_on" date,
	"supply_on" date,
	"due_on" date,
	"issued_at" timestamp with time zone,
	"issued_by" uuid,
	"terms" text NOT NULL,
	"total_minor" bigint DEFAULT 0 NOT NULL,
	"deposit_applied_minor" bigint DEFAULT 0 NOT NULL,
	"paid_minor" bigint DEFAULT 0 NOT NULL,
	"credited_minor" bigint DEFAULT 0 NOT NULL,
	"reference" text,
	"snapshot" jsonb,
	"pdf_file_id" uuid,
	"credits_invoice_id" uuid,
	"credit_reason" text,
	"sent_at" timestamp with time zone,
	"version" bigint DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "invoices_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "invoices_reference" UNIQUE("shop_id","reference")
);
--> statement-breakpoint
CREATE TABLE "bank_files" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"sha256" text NOT NULL,
	"opening_minor" bigint,
	"closing_minor" bigint,
	"line_count" integer NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"person_id" uuid,
	CONSTRAINT "bank_files_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "bank_files_once" UNIQUE("shop_id","sha256")
);
--> statement-breakpoint
CREATE TABLE "bank_lines" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"bank_file_id" uuid NOT NULL,
	"line_key" text NOT NULL,
	"date" date NOT NULL,
	"text" text NOT NULL,
	"amount_minor" bigint NOT NULL,
	"matched_kind" text,
	"matched_id" uuid,
	"matched_at" timestamp with time zone,
	"matched_by" uuid,
	"version" bigint DEFAULT 1 NOT NULL,
	CONSTRAINT "bank_lines_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "bank_lines_key" UNIQUE("shop_id","line_key")
);
--> statement-breakpoint
CREATE TABLE "payment_requests" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"purpose" text NOT NULL,
	"customer_id" uuid NOT NULL,
	"work_order_id" uuid,
	"estimate_id" uuid,
	"invoice_id" uuid,
	"amount_minor" bigint NOT NULL,
	"currency" text NOT NULL,
	"state" text DEFAULT 'new' NOT NULL,
	"provider_session_id" text,
	"url" text,
	"expires_at" timestamp with time zone,
	"paid_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "payment_requests_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "payments" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"receipt_number" text NOT NULL,
	"customer_id" uuid NOT NULL,
	"work_order_id" uuid,
	"estimate_id" uuid,
	"invoice_id" uuid,
	"purpose" text NOT NULL,
	"method" text NOT NULL,
	"amount_minor" bigint NOT NULL,
	"applied_minor" bigint DEFAULT 0 NOT NULL,
	"refunded_minor" bigint DEFAULT 0 NOT NULL,
	"provider_payment_id" text,
	"provider_charge_id" text,
	"payment_request_id" uuid,
	"note" text DEFAULT '' NOT NULL,
	"received_at" timestamp with time zone NOT NULL,
	"taken_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "payments_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "payments_receipt" UNIQUE("shop_id","receipt_number")
);
--> statement-breakpoint
CREATE TABLE "payout_items" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"payout_id" uuid NOT NULL,
	"provider_transaction_id" text NOT NULL,
	"kind" text NOT NULL,
	"source_id" text DEFAULT '' NOT NULL,
	"payment_id" uuid,
	"gross_minor" bigint NOT NULL,
	"fee_minor" bigint NOT NULL,
	"net_minor" bigint NOT NULL,
	CONSTRAINT "payout_items_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "payout_items_transaction" UNIQUE("shop_id","provider_transaction_id")
);
--> statement-breakpoint
CREATE TABLE "payouts" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"provider_payout_id" text NOT NULL,
	"amount_minor" bigint NOT NULL,
	"arrives_on" date NOT NULL,
	"state" text NOT NULL,
	"bank_line_id" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "payouts_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "payouts_provider" UNIQUE("shop_id","provider_payout_id")
);
--> statement-breakpoint
CREATE TABLE "refunds" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"payment_id" uuid NOT NULL,
	"amount_minor" bigint NOT NULL,
	"reason" text NOT NULL,
	"provider_refund_id" text,
	"state" text DEFAULT 'asked' NOT NULL,
	"asked_by" uuid,
	"accepted_by" uuid,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "refunds_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "counters" ADD CONSTRAINT "counters_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "devices" ADD CONSTRAINT "devices_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "files" ADD CONSTRAINT "files_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "pay_rates" ADD CONSTRAINT "pay_rates_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "people" ADD CONSTRAINT "people_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "people" ADD CONSTRAINT "people_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shop_settings" ADD CONSTRAINT "shop_settings_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_log" ADD CONSTRAINT "audit_log_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "command_log" ADD CONSTRAINT "command_log_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "jobs" ADD CONSTRAINT "jobs_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "links" ADD CONSTRAINT "links_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mail_messages" ADD CONSTRAINT "mail_messages_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "customers" ADD CONSTRAINT "customers_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tax_certificates" ADD CONSTRAINT "tax_certificates_shop_id_customer_id_customers_shop_id_id_fk" FOREIGN KEY ("shop_id","customer_id") REFERENCES "public"."customers"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kit_lines" ADD CONSTRAINT "kit_lines_shop_id_kit_part_id_parts_shop_id_id_fk" FOREIGN KEY ("shop_id","kit_part_id") REFERENCES "public"."parts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kit_lines" ADD CONSTRAINT "kit_lines_shop_id_part_id_parts_shop_id_id_fk" FOREIGN KEY ("shop_id","part_id") REFERENCES "public"."parts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lots" ADD CONSTRAINT "lots_shop_id_part_id_parts_shop_id_id_fk" FOREIGN KEY ("shop_id","part_id") REFERENCES "public"."parts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "parts" ADD CONSTRAINT "parts_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "parts" ADD CONSTRAINT "parts_shop_id_preferred_supplier_id_suppliers_shop_id_id_fk" FOREIGN KEY ("shop_id","preferred_supplier_id") REFERENCES "public"."suppliers"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_balances" ADD CONSTRAINT "stock_balances_shop_id_part_id_parts_shop_id_id_fk" FOREIGN KEY ("shop_id","part_id") REFERENCES "public"."parts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_movements" ADD CONSTRAINT "stock_movements_shop_id_part_id_parts_shop_id_id_fk" FOREIGN KEY ("shop_id","part_id") REFERENCES "public"."parts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_movements" ADD CONSTRAINT "stock_movements_shop_id_lot_id_lots_shop_id_id_fk" FOREIGN KEY ("shop_id","lot_id") REFERENCES "public"."lots"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "suppliers" ADD CONSTRAINT "suppliers_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "purchase_order_lines" ADD CONSTRAINT "purchase_order_lines_shop_id_purchase_order_id_purchase_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","purchase_order_id") REFERENCES "public"."purchase_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "purchase_order_lines" ADD CONSTRAINT "purchase_order_lines_shop_id_part_id_parts_shop_id_id_fk" FOREIGN KEY ("shop_id","part_id") REFERENCES "public"."parts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "purchase_orders" ADD CONSTRAINT "purchase_orders_shop_id_supplier_id_suppliers_shop_id_id_fk" FOREIGN KEY ("shop_id","supplier_id") REFERENCES "public"."suppliers"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receipt_lines" ADD CONSTRAINT "receipt_lines_shop_id_receipt_id_receipts_shop_id_id_fk" FOREIGN KEY ("shop_id","receipt_id") REFERENCES "public"."receipts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receipt_lines" ADD CONSTRAINT "receipt_lines_shop_id_purchase_order_line_id_purchase_order_lines_shop_id_id_fk" FOREIGN KEY ("shop_id","purchase_order_line_id") REFERENCES "public"."purchase_order_lines"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receipts" ADD CONSTRAINT "receipts_shop_id_purchase_order_id_purchase_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","purchase_order_id") REFERENCES "public"."purchase_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_shop_id_estimate_id_estimates_shop_id_id_fk" FOREIGN KEY ("shop_id","estimate_id") REFERENCES "public"."estimates"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cautions_seen" ADD CONSTRAINT "cautions_seen_shop_id_work_order_id_work_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","work_order_id") REFERENCES "public"."work_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "epoxy_fills" ADD CONSTRAINT "epoxy_fills_shop_id_piece_id_pieces_shop_id_id_fk" FOREIGN KEY ("shop_id","piece_id") REFERENCES "public"."pieces"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "estimate_lines" ADD CONSTRAINT "estimate_lines_shop_id_estimate_id_estimates_shop_id_id_fk" FOREIGN KEY ("shop_id","estimate_id") REFERENCES "public"."estimates"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "estimate_lines" ADD CONSTRAINT "estimate_lines_shop_id_piece_id_pieces_shop_id_id_fk" FOREIGN KEY ("shop_id","piece_id") REFERENCES "public"."pieces"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "estimate_lines" ADD CONSTRAINT "estimate_lines_shop_id_part_id_parts_shop_id_id_fk" FOREIGN KEY ("shop_id","part_id") REFERENCES "public"."parts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "estimates" ADD CONSTRAINT "estimates_shop_id_work_order_id_work_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","work_order_id") REFERENCES "public"."work_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "findings" ADD CONSTRAINT "findings_shop_id_piece_id_pieces_shop_id_id_fk" FOREIGN KEY ("shop_id","piece_id") REFERENCES "public"."pieces"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "findings" ADD CONSTRAINT "findings_shop_id_work_order_id_work_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","work_order_id") REFERENCES "public"."work_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "holds" ADD CONSTRAINT "holds_shop_id_piece_id_pieces_shop_id_id_fk" FOREIGN KEY ("shop_id","piece_id") REFERENCES "public"."pieces"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "inspections" ADD CONSTRAINT "inspections_shop_id_piece_id_pieces_shop_id_id_fk" FOREIGN KEY ("shop_id","piece_id") REFERENCES "public"."pieces"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "inspections" ADD CONSTRAINT "inspections_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "menu_operations" ADD CONSTRAINT "menu_operations_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "operations" ADD CONSTRAINT "operations_shop_id_work_order_id_work_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","work_order_id") REFERENCES "public"."work_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "operations" ADD CONSTRAINT "operations_shop_id_piece_id_pieces_shop_id_id_fk" FOREIGN KEY ("shop_id","piece_id") REFERENCES "public"."pieces"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "promises" ADD CONSTRAINT "promises_shop_id_work_order_id_work_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","work_order_id") REFERENCES "public"."work_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receiving_checks" ADD CONSTRAINT "receiving_checks_shop_id_piece_id_pieces_shop_id_id_fk" FOREIGN KEY ("shop_id","piece_id") REFERENCES "public"."pieces"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shipments" ADD CONSTRAINT "shipments_shop_id_work_order_id_work_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","work_order_id") REFERENCES "public"."work_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "work_order_parts" ADD CONSTRAINT "work_order_parts_shop_id_work_order_id_work_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","work_order_id") REFERENCES "public"."work_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "work_order_parts" ADD CONSTRAINT "work_order_parts_shop_id_part_id_parts_shop_id_id_fk" FOREIGN KEY ("shop_id","part_id") REFERENCES "public"."parts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "work_orders" ADD CONSTRAINT "work_orders_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "work_orders" ADD CONSTRAINT "work_orders_shop_id_customer_id_customers_shop_id_id_fk" FOREIGN KEY ("shop_id","customer_id") REFERENCES "public"."customers"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "pieces" ADD CONSTRAINT "pieces_shop_id_work_order_id_work_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","work_order_id") REFERENCES "public"."work_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "correction_requests" ADD CONSTRAINT "correction_requests_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "punches" ADD CONSTRAINT "punches_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "time_entries" ADD CONSTRAINT "time_entries_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "time_entries" ADD CONSTRAINT "time_entries_shop_id_operation_id_operations_shop_id_id_fk" FOREIGN KEY ("shop_id","operation_id") REFERENCES "public"."operations"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "bench_checks" ADD CONSTRAINT "bench_checks_shop_id_bench_id_benches_shop_id_id_fk" FOREIGN KEY ("shop_id","bench_id") REFERENCES "public"."benches"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "bench_checks" ADD CONSTRAINT "bench_checks_shop_id_strikes_bench_checks_shop_id_id_fk" FOREIGN KEY ("shop_id","strikes") REFERENCES "public"."bench_checks"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "benches" ADD CONSTRAINT "benches_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "camshafts" ADD CONSTRAINT "camshafts_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "check_plates" ADD CONSTRAINT "check_plates_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "engine_families" ADD CONSTRAINT "engine_families_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fixtures" ADD CONSTRAINT "fixtures_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flow_comparisons" ADD CONSTRAINT "flow_comparisons_shop_id_head_id_heads_shop_id_id_fk" FOREIGN KEY ("shop_id","head_id") REFERENCES "public"."heads"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flow_readings" ADD CONSTRAINT "flow_readings_shop_id_test_id_flow_tests_shop_id_id_fk" FOREIGN KEY ("shop_id","test_id") REFERENCES "public"."flow_tests"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flow_test_summaries" ADD CONSTRAINT "flow_test_summaries_shop_id_test_id_flow_tests_shop_id_id_fk" FOREIGN KEY ("shop_id","test_id") REFERENCES "public"."flow_tests"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flow_test_summaries" ADD CONSTRAINT "flow_test_summaries_shop_id_bench_id_benches_shop_id_id_fk" FOREIGN KEY ("shop_id","bench_id") REFERENCES "public"."benches"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flow_tests" ADD CONSTRAINT "flow_tests_shop_id_head_id_heads_shop_id_id_fk" FOREIGN KEY ("shop_id","head_id") REFERENCES "public"."heads"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flow_tests" ADD CONSTRAINT "flow_tests_shop_id_bench_id_benches_shop_id_id_fk" FOREIGN KEY ("shop_id","bench_id") REFERENCES "public"."benches"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flow_tests" ADD CONSTRAINT "flow_tests_shop_id_fixture_id_fixtures_shop_id_id_fk" FOREIGN KEY ("shop_id","fixture_id") REFERENCES "public"."fixtures"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flow_tests" ADD CONSTRAINT "flow_tests_shop_id_lift_device_id_lift_devices_shop_id_id_fk" FOREIGN KEY ("shop_id","lift_device_id") REFERENCES "public"."lift_devices"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flow_tests" ADD CONSTRAINT "flow_tests_shop_id_camshaft_id_camshafts_shop_id_id_fk" FOREIGN KEY ("shop_id","camshaft_id") REFERENCES "public"."camshafts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flow_tests" ADD CONSTRAINT "flow_tests_shop_id_operator_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","operator_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "heads" ADD CONSTRAINT "heads_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "heads" ADD CONSTRAINT "heads_shop_id_piece_id_pieces_shop_id_id_fk" FOREIGN KEY ("shop_id","piece_id") REFERENCES "public"."pieces"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lift_devices" ADD CONSTRAINT "lift_devices_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "measurement_limits" ADD CONSTRAINT "measurement_limits_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "measurements" ADD CONSTRAINT "measurements_shop_id_head_id_heads_shop_id_id_fk" FOREIGN KEY ("shop_id","head_id") REFERENCES "public"."heads"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "accounts" ADD CONSTRAINT "accounts_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "journal_entries" ADD CONSTRAINT "journal_entries_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "journal_lines" ADD CONSTRAINT "journal_lines_shop_id_entry_id_journal_entries_shop_id_id_fk" FOREIGN KEY ("shop_id","entry_id") REFERENCES "public"."journal_entries"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "journal_lines" ADD CONSTRAINT "journal_lines_shop_id_account_code_accounts_shop_id_code_fk" FOREIGN KEY ("shop_id","account_code") REFERENCES "public"."accounts"("shop_id","code") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "periods" ADD CONSTRAINT "periods_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_lines" ADD CONSTRAINT "invoice_lines_shop_id_invoice_id_invoices_shop_id_id_fk" FOREIGN KEY ("shop_id","invoice_id") REFERENCES "public"."invoices"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_shop_id_customer_id_customers_shop_id_id_fk" FOREIGN KEY ("shop_id","customer_id") REFERENCES "public"."customers"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_shop_id_work_order_id_work_orders_shop_id_id_fk" FOREIGN KEY ("shop_id","work_order_id") REFERENCES "public"."work_orders"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "bank_files" ADD CONSTRAINT "bank_files_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "bank_lines" ADD CONSTRAINT "bank_lines_shop_id_bank_file_id_bank_files_shop_id_id_fk" FOREIGN KEY ("shop_id","bank_file_id") REFERENCES "public"."bank_files"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payment_requests" ADD CONSTRAINT "payment_requests_shop_id_customer_id_customers_shop_id_id_fk" FOREIGN KEY ("shop_id","customer_id") REFERENCES "public"."customers"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_shop_id_customer_id_customers_shop_id_id_fk" FOREIGN KEY ("shop_id","customer_id") REFERENCES "public"."customers"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payout_items" ADD CONSTRAINT "payout_items_shop_id_payout_id_payouts_shop_id_id_fk" FOREIGN KEY ("shop_id","payout_id") REFERENCES "public"."payouts"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payouts" ADD CONSTRAINT "payouts_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "refunds" ADD CONSTRAINT "refunds_shop_id_payment_id_payments_shop_id_id_fk" FOREIGN KEY ("shop_id","payment_id") REFERENCES "public"."payments"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "devices_token" ON "devices" USING btree ("token_hash") WHERE token_hash is not null;--> statement-breakpoint
CREATE UNIQUE INDEX "devices_enrol" ON "devices" USING btree ("enrol_code_hash") WHERE enrol_code_hash is not null;--> statement-breakpoint
CREATE INDEX "files_subject" ON "files" USING btree ("shop_id","subject_kind","subject_id");--> statement-breakpoint
CREATE UNIQUE INDEX "people_badge" ON "people" USING btree ("shop_id","badge_code") WHERE badge_code is not null;--> statement-breakpoint
CREATE UNIQUE INDEX "people_user" ON "people" USING btree ("shop_id","user_id") WHERE user_id is not null;--> statement-breakpoint
CREATE INDEX "people_by_user" ON "people" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "sessions_user" ON "sessions" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "audit_subject" ON "audit_log" USING btree ("shop_id","subject_kind","subject_id");--> statement-breakpoint
CREATE UNIQUE INDEX "jobs_dedupe" ON "jobs" USING btree ("shop_id","task","dedupe_key") WHERE dedupe_key is not null;--> statement-breakpoint
CREATE INDEX "jobs_ready" ON "jobs" USING btree ("run_at") WHERE done_at is null and parked_at is null;--> statement-breakpoint
CREATE INDEX "links_subject" ON "links" USING btree ("shop_id","subject_id");--> statement-breakpoint
CREATE INDEX "mail_subject" ON "mail_messages" USING btree ("shop_id","subject_kind","subject_id");--> statement-breakpoint
CREATE INDEX "customers_name" ON "customers" USING btree ("shop_id","name_key");--> statement-breakpoint
CREATE INDEX "customers_phone" ON "customers" USING btree ("shop_id","phone_digits");--> statement-breakpoint
CREATE UNIQUE INDEX "movement_reversed_once" ON "stock_movements" USING btree ("shop_id","reverses_id") WHERE reverses_id is not null;--> statement-breakpoint
CREATE INDEX "movements_part" ON "stock_movements" USING btree ("shop_id","part_id","seq");--> statement-breakpoint
CREATE INDEX "movements_work_order" ON "stock_movements" USING btree ("shop_id","work_order_id");--> statement-breakpoint
CREATE INDEX "purchase_orders_created" ON "purchase_orders" USING btree ("shop_id","created_at");--> statement-breakpoint
CREATE INDEX "operations_piece" ON "operations" USING btree ("shop_id","piece_id","sequence");--> statement-breakpoint
CREATE INDEX "work_order_parts_part" ON "work_order_parts" USING btree ("shop_id","part_id");--> statement-breakpoint
CREATE INDEX "work_orders_customer" ON "work_orders" USING btree ("shop_id","customer_id");--> statement-breakpoint
CREATE INDEX "work_orders_opened" ON "work_orders" USING btree ("shop_id","opened_at");--> statement-breakpoint
CREATE UNIQUE INDEX "pieces_tag" ON "pieces" USING btree ("shop_id","tag") WHERE tag is not null;--> statement-breakpoint
CREATE INDEX "punches_person" ON "punches" USING btree ("shop_id","person_id","at");--> statement-breakpoint
CREATE UNIQUE INDEX "time_one_open" ON "time_entries" USING btree ("shop_id","person_id","clock") WHERE ended_at is null and voided_at is null;--> statement-breakpoint
CREATE INDEX "time_entries_operation" ON "time_entries" USING btree ("shop_id","operation_id");--> statement-breakpoint
CREATE INDEX "time_entries_started" ON "time_entries" USING btree ("shop_id","started_at");--> statement-breakpoint
CREATE UNIQUE INDEX "bench_check_struck_once" ON "bench_checks" USING btree ("shop_id","strikes") WHERE strikes is not null;--> statement-breakpoint
CREATE INDEX "bench_checks_at" ON "bench_checks" USING btree ("shop_id","bench_id","at");--> statement-breakpoint
CREATE INDEX "flow_test_summaries_repeats" ON "flow_test_summaries" USING btree ("shop_id","bench_id","started_at") WHERE repeat_dof > 0;--> statement-breakpoint
CREATE INDEX "flow_test_summaries_family" ON "flow_test_summaries" USING btree ("shop_id","family","side","started_at");--> statement-breakpoint
CREATE INDEX "flow_test_summaries_best" ON "flow_test_summaries" USING btree ("shop_id","family","side","mean_to_cam_cfm");--> statement-breakpoint
CREATE INDEX "flow_test_summaries_head" ON "flow_test_summaries" USING btree ("shop_id","head_id");--> statement-breakpoint
CREATE INDEX "flow_tests_head" ON "flow_tests" USING btree ("shop_id","head_id","side");--> statement-breakpoint
CREATE INDEX "flow_tests_started" ON "flow_tests" USING btree ("shop_id","started_at","id");--> statement-breakpoint
CREATE INDEX "flow_tests_corrects" ON "flow_tests" USING btree ("shop_id","corrects_test_id") WHERE corrects_test_id is not null;--> statement-breakpoint
CREATE UNIQUE INDEX "heads_piece" ON "heads" USING btree ("shop_id","piece_id") WHERE piece_id is not null;--> statement-breakpoint
CREATE INDEX "heads_family" ON "heads" USING btree ("shop_id","family");--> statement-breakpoint
CREATE INDEX "journal_entries_date" ON "journal_entries" USING btree ("shop_id","date");--> statement-breakpoint
CREATE INDEX "journal_entries_work_order" ON "journal_entries" USING btree ("shop_id","work_order_id");--> statement-breakpoint
CREATE INDEX "journal_lines_account" ON "journal_lines" USING btree ("shop_id","account_code");--> statement-breakpoint
CREATE UNIQUE INDEX "invoices_number" ON "invoices" USING btree ("shop_id","number") WHERE number is not null;--> statement-breakpoint
CREATE INDEX "invoices_customer" ON "invoices" USING btree ("shop_id","customer_id");--> statement-breakpoint
CREATE UNIQUE INDEX "payment_requests_session" ON "payment_requests" USING btree ("provider_session_id") WHERE provider_session_id is not null;--> statement-breakpoint
CREATE UNIQUE INDEX "payments_provider" ON "payments" USING btree ("shop_id","provider_payment_id") WHERE provider_payment_id is not null;--> statement-breakpoint
CREATE INDEX "payments_invoice" ON "payments" USING btree ("shop_id","invoice_id");--> statement-breakpoint
CREATE INDEX "payments_provider_id" ON "payments" USING btree ("provider_payment_id");