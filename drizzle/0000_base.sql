CREATE TABLE "closures" (
	"id" uuid PRIMARY KEY NOT NULL,
	"cryostat_id" uuid NOT NULL,
	"during" "tstzrange" NOT NULL,
	"reason" text NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "closures_bounded" CHECK (not isempty("closures"."during") and not lower_inf("closures"."during") and not upper_inf("closures"."during"))
);
--> statement-breakpoint
CREATE TABLE "cryostat_holds" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "cryostat_holds_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"cryostat_id" uuid NOT NULL,
	"during" "tstzrange" NOT NULL,
	"run_id" uuid,
	"closure_id" uuid,
	CONSTRAINT "cryostat_holds_run_id_unique" UNIQUE("run_id"),
	CONSTRAINT "cryostat_holds_closure_id_unique" UNIQUE("closure_id")
);
--> statement-breakpoint
CREATE TABLE "cryostats" (
	"id" uuid PRIMARY KEY NOT NULL,
	"slug" text NOT NULL,
	"name" text NOT NULL,
	"kind" text NOT NULL,
	"position" integer NOT NULL,
	"base_temperature_k" double precision NOT NULL,
	"maximum_field_t" double precision DEFAULT 0 NOT NULL,
	"uses_liquid" boolean NOT NULL,
	"nitrogen_precool" boolean NOT NULL,
	"vessel_calibration" jsonb NOT NULL,
	"cold_mass" jsonb NOT NULL,
	"static_boil_off_litres_per_hour" double precision NOT NULL,
	"transfer_loss_fraction" double precision NOT NULL,
	"recovery_fraction" double precision NOT NULL,
	"gas_use_prior" jsonb NOT NULL,
	"phase_hours_prior" jsonb NOT NULL,
	"link_conductance_w_per_k" double precision NOT NULL,
	"room_volume_m3" double precision NOT NULL,
	"retired_at" timestamp with time zone,
	CONSTRAINT "cryostats_slug_unique" UNIQUE("slug"),
	CONSTRAINT "cryostats_kind" CHECK ("cryostats"."kind" in ('bath-he4', 'he3-insert', 'dilution', 'closed-cycle')),
	CONSTRAINT "cryostats_fractions" CHECK ("cryostats"."transfer_loss_fraction" between 0 and 1 and "cryostats"."recovery_fraction" between 0 and 1)
);
--> statement-breakpoint
CREATE TABLE "facilities" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"time_zone" text NOT NULL,
	"currency" text NOT NULL,
	"address_lines" jsonb NOT NULL,
	"email" text NOT NULL,
	"vat_id" text NOT NULL,
	"bank_account" text NOT NULL,
	"reserve_litres" double precision NOT NULL,
	"pay_by_hours" integer NOT NULL,
	"quote_lock_days" integer NOT NULL,
	"payment_term_days" integer NOT NULL,
	"refund_ladder" jsonb NOT NULL,
	"check_thresholds" jsonb DEFAULT '{}'::jsonb NOT NULL
);
--> statement-breakpoint
CREATE TABLE "helium_accounts" (
	"id" uuid PRIMARY KEY NOT NULL,
	"kind" text NOT NULL,
	"name" text NOT NULL,
	"cryostat_id" uuid,
	"capacity_litres" double precision,
	CONSTRAINT "helium_accounts_name_unique" UNIQUE("name"),
	CONSTRAINT "helium_accounts_cryostat_id_unique" UNIQUE("cryostat_id"),
	CONSTRAINT "helium_accounts_kind" CHECK ("helium_accounts"."kind" in ('supplier', 'dewar', 'cryostat', 'recovery', 'lost'))
);
--> statement-breakpoint
CREATE TABLE "helium_deliveries" (
	"id" uuid PRIMARY KEY NOT NULL,
	"due_at" timestamp with time zone NOT NULL,
	"litres" double precision NOT NULL,
	"dewar_account_id" uuid NOT NULL,
	"supplier_reference" text NOT NULL,
	"received_at" timestamp with time zone,
	"movement_id" uuid,
	CONSTRAINT "helium_deliveries_litres" CHECK ("helium_deliveries"."litres" > 0)
);
--> statement-breakpoint
CREATE TABLE "helium_movements" (
	"id" uuid PRIMARY KEY NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"reason" text NOT NULL,
	"run_id" uuid,
	"entry_id" uuid,
	"recorded_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "helium_postings" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "helium_postings_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"movement_id" uuid NOT NULL,
	"account_id" uuid NOT NULL,
	"amount_mg" bigint NOT NULL
);
--> statement-breakpoint
CREATE TABLE "invoice_counters" (
	"series" text NOT NULL,
	"year" integer NOT NULL,
	"last_sequence" integer NOT NULL,
	CONSTRAINT "invoice_counters_series_year_pk" PRIMARY KEY("series","year")
);
--> statement-breakpoint
CREATE TABLE "invoice_documents" (
	"invoice_id" uuid PRIMARY KEY NOT NULL,
	"file_key" text NOT NULL,
	"sha256" text NOT NULL,
	"bytes" integer NOT NULL,
	"rendered_at" timestamp with time zone DEFAULT now() NOT NULL,
	"rendered_by" uuid
);
--> statement-breakpoint
CREATE TABLE "invoice_lines" (
	"invoice_id" uuid NOT NULL,
	"position" integer NOT NULL,
	"kind" text NOT NULL,
	"label" text NOT NULL,
	"unit" text NOT NULL,
	"estimated_quantity" double precision,
	"quantity" double precision NOT NULL,
	"unit_price_minor" bigint NOT NULL,
	"estimated_net_minor" bigint,
	"net_minor" bigint NOT NULL,
	CONSTRAINT "invoice_lines_invoice_id_position_pk" PRIMARY KEY("invoice_id","position")
);
--> statement-breakpoint
CREATE TABLE "invoices" (
	"id" uuid PRIMARY KEY NOT NULL,
	"kind" text NOT NULL,
	"series" text DEFAULT 'A' NOT NULL,
	"year" integer NOT NULL,
	"sequence" integer NOT NULL,
	"number" text NOT NULL,
	"run_id" uuid NOT NULL,
	"group_id" uuid NOT NULL,
	"corrects_invoice_id" uuid,
	"issued_at" timestamp with time zone NOT NULL,
	"issued_on" date NOT NULL,
	"due_on" date,
	"supplied_on" date NOT NULL,
	"seller" jsonb NOT NULL,
	"buyer" jsonb NOT NULL,
	"reference" text DEFAULT '' NOT NULL,
	"currency" text NOT NULL,
	"vat_basis_points" integer NOT NULL,
	"reverse_charge" boolean NOT NULL,
	"net_minor" bigint NOT NULL,
	"vat_minor" bigint NOT NULL,
	"total_minor" bigint NOT NULL,
	"prepaid_minor" bigint NOT NULL,
	"due_minor" bigint NOT NULL,
	"payment_text" text NOT NULL,
	CONSTRAINT "invoices_number_unique" UNIQUE("number"),
	CONSTRAINT "invoices_kind" CHECK ("invoices"."kind" in ('invoice', 'credit-note')),
	CONSTRAINT "invoices_amounts" CHECK ("invoices"."net_minor" >= 0 and "invoices"."vat_minor" >= 0 and "invoices"."prepaid_minor" >= 0 and "invoices"."total_minor" = "invoices"."net_minor" + "invoices"."vat_minor" and "invoices"."due_minor" = "invoices"."total_minor" - "invoices"."prepaid_minor")
);
--> statement-breakpoint
CREATE TABLE "payment_events" (
	"id" text PRIMARY KEY NOT NULL,
	"type" text NOT NULL,
	"object_id" text NOT NULL,
	"payload" jsonb NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	"processed_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "payments" (
	"id" uuid PRIMARY KEY NOT NULL,
	"run_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"attempt" integer NOT NULL,
	"state" text NOT NULL,
	"amount_minor" bigint NOT NULL,
	"currency" text NOT NULL,
	"idempotency_key" text NOT NULL,
	"session_id" text,
	"checkout_url" text,
	"intent_id" text,
	"refund_id" text,
	"action_url" text,
	"failure" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"settled_at" timestamp with time zone,
	CONSTRAINT "payments_idempotency_key_unique" UNIQUE("idempotency_key"),
	CONSTRAINT "payments_session_id_unique" UNIQUE("session_id"),
	CONSTRAINT "payments_refund_id_unique" UNIQUE("refund_id"),
	CONSTRAINT "payments_kind" CHECK ("payments"."kind" in ('deposit', 'balance', 'refund')),
	CONSTRAINT "payments_state" CHECK ("payments"."state" in ('open', 'succeeded', 'requires-action', 'failed', 'expired')),
	CONSTRAINT "payments_amount" CHECK ("payments"."amount_minor" > 0)
);
--> statement-breakpoint
CREATE TABLE "rate_card_prices" (
	"rate_card_id" uuid NOT NULL,
	"group_class" text NOT NULL,
	"per_cooldown_minor" bigint NOT NULL,
	"per_day_minor" bigint NOT NULL,
	"per_litre_minor" bigint NOT NULL,
	"recovery_credit_per_litre_minor" bigint NOT NULL,
	"per_operator_hour_minor" bigint NOT NULL,
	"per_mounting_minor" bigint NOT NULL,
	"minimum_minor" bigint NOT NULL,
	"vat_basis_points" integer NOT NULL,
	CONSTRAINT "rate_card_prices_rate_card_id_group_class_pk" PRIMARY KEY("rate_card_id","group_class"),
	CONSTRAINT "rate_card_prices_class" CHECK ("rate_card_prices"."group_class" in ('internal', 'academic', 'industry')),
	CONSTRAINT "rate_card_prices_not_negative" CHECK (least("rate_card_prices"."per_cooldown_minor", "rate_card_prices"."per_day_minor", "rate_card_prices"."per_litre_minor", "rate_card_prices"."recovery_credit_per_litre_minor", "rate_card_prices"."per_operator_hour_minor", "rate_card_prices"."per_mounting_minor", "rate_card_prices"."minimum_minor") >= 0 and "rate_card_prices"."vat_basis_points" between 0 and 10000)
);
--> statement-breakpoint
CREATE TABLE "rate_cards" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"valid_from" date NOT NULL,
	"currency" text NOT NULL,
	"deposit_percent" integer NOT NULL,
	"issued_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "rate_cards_deposit" CHECK ("rate_cards"."deposit_percent" between 0 and 100)
);
--> statement-breakpoint
CREATE TABLE "audit_events" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "audit_events_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"actor_id" uuid,
	"action" text NOT NULL,
	"object_type" text NOT NULL,
	"object_id" text,
	"request_id" text,
	"detail" jsonb DEFAULT '{}'::jsonb NOT NULL
);
--> statement-breakpoint
CREATE TABLE "group_memberships" (
	"group_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"role" text NOT NULL,
	CONSTRAINT "group_memberships_group_id_person_id_pk" PRIMARY KEY("group_id","person_id"),
	CONSTRAINT "group_memberships_role" CHECK ("group_memberships"."role" in ('member', 'pi'))
);
--> statement-breakpoint
CREATE TABLE "groups" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"class" text NOT NULL,
	"institution" text NOT NULL,
	"address_lines" jsonb NOT NULL,
	"invoice_email" text NOT NULL,
	"vat_id" text,
	"reverse_charge" boolean DEFAULT false NOT NULL,
	"cost_codes" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"cap_minor" bigint,
	"payment_customer_id" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "groups_name_unique" UNIQUE("name"),
	CONSTRAINT "groups_class" CHECK ("groups"."class" in ('internal', 'academic', 'industry')),
	CONSTRAINT "groups_cap" CHECK ("groups"."cap_minor" is null or "groups"."cap_minor" >= 0)
);
--> statement-breakpoint
CREATE TABLE "people" (
	"id" uuid PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"is_manager" boolean DEFAULT false NOT NULL,
	"is_operator" boolean DEFAULT false NOT NULL,
	"time_zone" text,
	"disabled_at" timestamp with time zone,
	"failed_sign_ins" integer DEFAULT 0 NOT NULL,
	"retry_after" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" uuid PRIMARY KEY NOT NULL,
	"secret_hash" text NOT NULL,
	"person_id" uuid NOT NULL,
	"user_agent" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_seen_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	CONSTRAINT "sessions_secret_hash_unique" UNIQUE("secret_hash")
);
--> statement-breakpoint
CREATE TABLE "analyses" (
	"id" uuid PRIMARY KEY NOT NULL,
	"dataset_id" uuid NOT NULL,
	"addenda_dataset_id" uuid,
	"created_by" uuid NOT NULL,
	"sample" jsonb NOT NULL,
	"result" jsonb NOT NULL,
	"verdict" text NOT NULL,
	"engine_version" text NOT NULL,
	"correction" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "analyses_verdict" CHECK ("analyses"."verdict" in ('ok', 'caution', 'fail'))
);
--> statement-breakpoint
CREATE TABLE "analysis_comments" (
	"id" uuid PRIMARY KEY NOT NULL,
	"analysis_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"text" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "datasets" (
	"id" uuid PRIMARY KEY NOT NULL,
	"run_id" uuid NOT NULL,
	"sample_id" uuid,
	"role" text DEFAULT 'measurement' NOT NULL,
	"original_name" text NOT NULL,
	"file_key" text NOT NULL,
	"bytes" integer NOT NULL,
	"sha256" text NOT NULL,
	"uploaded_by" uuid NOT NULL,
	"mapping" jsonb,
	"row_count" integer,
	"rejected_rows" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"temperature_k" double precision[],
	"heat_capacity" double precision[],
	"sigma" double precision[],
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "datasets_role" CHECK ("datasets"."role" in ('measurement', 'addenda', 'copper-standard'))
);
--> statement-breakpoint
CREATE TABLE "sign_offs" (
	"id" uuid PRIMARY KEY NOT NULL,
	"analysis_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"accepted" boolean NOT NULL,
	"reason" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "run_entries" (
	"id" uuid PRIMARY KEY NOT NULL,
	"run_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"recorded_by" uuid,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"client_key" uuid NOT NULL,
	"phase" text,
	"level_percent" double precision,
	"liquid_litres" double precision,
	"boil_off_litres_per_hour" double precision,
	"outside_usual" boolean DEFAULT false NOT NULL,
	"started_at" timestamp with time zone,
	"from_account_id" uuid,
	"drawn_litres" double precision,
	"before_litres" double precision,
	"temperature_k" double precision,
	"gas_meter_m3" double precision,
	"note" text DEFAULT '' NOT NULL,
	CONSTRAINT "run_entries_client_key_unique" UNIQUE("client_key"),
	CONSTRAINT "run_entries_kind" CHECK ("run_entries"."kind" in ('phase', 'level', 'transfer', 'temperature', 'gas-meter', 'note')),
	CONSTRAINT "run_entries_level" CHECK ("run_entries"."level_percent" is null or "run_entries"."level_percent" between 0 and 100),
	CONSTRAINT "run_entries_temperature" CHECK ("run_entries"."temperature_k" is null or "run_entries"."temperature_k" > 0),
	CONSTRAINT "run_entries_transfer" CHECK ("run_entries"."kind" <> 'transfer' or (num_nonnulls("run_entries"."from_account_id", "run_entries"."started_at", "run_entries"."drawn_litres", "run_entries"."before_litres", "run_entries"."liquid_litres") = 5 and "run_entries"."drawn_litres" > 0 and "run_entries"."before_litres" >= 0 and "run_entries"."liquid_litres" between "run_entries"."before_litres" and "run_entries"."before_litres" + "run_entries"."drawn_litres" and "run_entries"."started_at" <= "run_entries"."at"))
);
--> statement-breakpoint
CREATE TABLE "run_samples" (
	"run_id" uuid NOT NULL,
	"sample_id" uuid NOT NULL,
	CONSTRAINT "run_samples_run_id_sample_id_pk" PRIMARY KEY("run_id","sample_id")
);
--> statement-breakpoint
CREATE TABLE "run_transitions" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "run_transitions_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"run_id" uuid NOT NULL,
	"from_state" text,
	"to_state" text NOT NULL,
	"actor_id" uuid,
	"reason" text DEFAULT '' NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "runs" (
	"id" uuid PRIMARY KEY NOT NULL,
	"number" integer GENERATED ALWAYS AS IDENTITY (sequence name "runs_number_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"title" text NOT NULL,
	"cryostat_id" uuid NOT NULL,
	"group_id" uuid NOT NULL,
	"requested_by" uuid NOT NULL,
	"state" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"slot" "tstzrange" NOT NULL,
	"plan_input" jsonb NOT NULL,
	"estimate" jsonb NOT NULL,
	"quote" jsonb NOT NULL,
	"rate_card_id" uuid NOT NULL,
	"cost_code" text,
	"purchase_order" text,
	"pay_by" timestamp with time zone,
	"started_at" timestamp with time zone,
	"finished_at" timestamp with time zone,
	"cut_short" boolean DEFAULT false NOT NULL,
	"operator_hours" double precision,
	"client_key" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "runs_number_unique" UNIQUE("number"),
	CONSTRAINT "runs_client_key_unique" UNIQUE("client_key"),
	CONSTRAINT "runs_state" CHECK ("runs"."state" in ('draft', 'asked', 'approved', 'confirmed', 'running', 'finished', 'settled', 'declined', 'withdrawn', 'lapsed')),
	CONSTRAINT "runs_slot_bounded" CHECK (not isempty("runs"."slot") and not lower_inf("runs"."slot") and not upper_inf("runs"."slot"))
);
--> statement-breakpoint
CREATE TABLE "samples" (
	"id" uuid PRIMARY KEY NOT NULL,
	"group_id" uuid NOT NULL,
	"created_by" uuid NOT NULL,
	"name" text NOT NULL,
	"formula" text NOT NULL,
	"kind" text NOT NULL,
	"molar_mass_g_per_mol" double precision NOT NULL,
	"atoms_per_formula_unit" double precision NOT NULL,
	"mass_mg" double precision,
	"mass_uncertainty_mg" double precision,
	"density_g_per_cm3" double precision,
	"conduction_electrons" double precision,
	"critical_temperature_k" double precision,
	"hazards" text DEFAULT '' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "samples_kind" CHECK ("samples"."kind" in ('metal', 'superconductor', 'insulator', 'unknown')),
	CONSTRAINT "samples_mass" CHECK (("samples"."mass_mg" is null or "samples"."mass_mg" > 0) and ("samples"."mass_uncertainty_mg" is null or "samples"."mass_uncertainty_mg" >= 0))
);
--> statement-breakpoint
ALTER TABLE "closures" ADD CONSTRAINT "closures_cryostat_id_cryostats_id_fk" FOREIGN KEY ("cryostat_id") REFERENCES "public"."cryostats"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "closures" ADD CONSTRAINT "closures_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cryostat_holds" ADD CONSTRAINT "cryostat_holds_cryostat_id_cryostats_id_fk" FOREIGN KEY ("cryostat_id") REFERENCES "public"."cryostats"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "helium_accounts" ADD CONSTRAINT "helium_accounts_cryostat_id_cryostats_id_fk" FOREIGN KEY ("cryostat_id") REFERENCES "public"."cryostats"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "helium_deliveries" ADD CONSTRAINT "helium_deliveries_dewar_account_id_helium_accounts_id_fk" FOREIGN KEY ("dewar_account_id") REFERENCES "public"."helium_accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "helium_deliveries" ADD CONSTRAINT "helium_deliveries_movement_id_helium_movements_id_fk" FOREIGN KEY ("movement_id") REFERENCES "public"."helium_movements"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "helium_movements" ADD CONSTRAINT "helium_movements_run_id_runs_id_fk" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "helium_movements" ADD CONSTRAINT "helium_movements_entry_id_run_entries_id_fk" FOREIGN KEY ("entry_id") REFERENCES "public"."run_entries"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "helium_movements" ADD CONSTRAINT "helium_movements_recorded_by_people_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "helium_postings" ADD CONSTRAINT "helium_postings_movement_id_helium_movements_id_fk" FOREIGN KEY ("movement_id") REFERENCES "public"."helium_movements"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "helium_postings" ADD CONSTRAINT "helium_postings_account_id_helium_accounts_id_fk" FOREIGN KEY ("account_id") REFERENCES "public"."helium_accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_documents" ADD CONSTRAINT "invoice_documents_invoice_id_invoices_id_fk" FOREIGN KEY ("invoice_id") REFERENCES "public"."invoices"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_documents" ADD CONSTRAINT "invoice_documents_rendered_by_people_id_fk" FOREIGN KEY ("rendered_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_lines" ADD CONSTRAINT "invoice_lines_invoice_id_invoices_id_fk" FOREIGN KEY ("invoice_id") REFERENCES "public"."invoices"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_run_id_runs_id_fk" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_group_id_groups_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."groups"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_corrects_invoice_id_invoices_id_fk" FOREIGN KEY ("corrects_invoice_id") REFERENCES "public"."invoices"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_run_id_runs_id_fk" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rate_card_prices" ADD CONSTRAINT "rate_card_prices_rate_card_id_rate_cards_id_fk" FOREIGN KEY ("rate_card_id") REFERENCES "public"."rate_cards"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "group_memberships" ADD CONSTRAINT "group_memberships_group_id_groups_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."groups"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "group_memberships" ADD CONSTRAINT "group_memberships_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "analyses" ADD CONSTRAINT "analyses_dataset_id_datasets_id_fk" FOREIGN KEY ("dataset_id") REFERENCES "public"."datasets"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "analyses" ADD CONSTRAINT "analyses_addenda_dataset_id_datasets_id_fk" FOREIGN KEY ("addenda_dataset_id") REFERENCES "public"."datasets"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "analyses" ADD CONSTRAINT "analyses_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "analysis_comments" ADD CONSTRAINT "analysis_comments_analysis_id_analyses_id_fk" FOREIGN KEY ("analysis_id") REFERENCES "public"."analyses"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "analysis_comments" ADD CONSTRAINT "analysis_comments_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "datasets" ADD CONSTRAINT "datasets_run_id_runs_id_fk" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "datasets" ADD CONSTRAINT "datasets_sample_id_samples_id_fk" FOREIGN KEY ("sample_id") REFERENCES "public"."samples"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "datasets" ADD CONSTRAINT "datasets_uploaded_by_people_id_fk" FOREIGN KEY ("uploaded_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_offs" ADD CONSTRAINT "sign_offs_analysis_id_analyses_id_fk" FOREIGN KEY ("analysis_id") REFERENCES "public"."analyses"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_offs" ADD CONSTRAINT "sign_offs_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_entries" ADD CONSTRAINT "run_entries_run_id_runs_id_fk" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_entries" ADD CONSTRAINT "run_entries_recorded_by_people_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_samples" ADD CONSTRAINT "run_samples_run_id_runs_id_fk" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_samples" ADD CONSTRAINT "run_samples_sample_id_samples_id_fk" FOREIGN KEY ("sample_id") REFERENCES "public"."samples"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_transitions" ADD CONSTRAINT "run_transitions_run_id_runs_id_fk" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_transitions" ADD CONSTRAINT "run_transitions_actor_id_people_id_fk" FOREIGN KEY ("actor_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_cryostat_id_cryostats_id_fk" FOREIGN KEY ("cryostat_id") REFERENCES "public"."cryostats"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_group_id_groups_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."groups"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_requested_by_people_id_fk" FOREIGN KEY ("requested_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_rate_card_id_rate_cards_id_fk" FOREIGN KEY ("rate_card_id") REFERENCES "public"."rate_cards"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "samples" ADD CONSTRAINT "samples_group_id_groups_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."groups"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "samples" ADD CONSTRAINT "samples_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "closures_cryostat" ON "closures" USING btree ("cryostat_id");--> statement-breakpoint
CREATE INDEX "helium_movements_run" ON "helium_movements" USING btree ("run_id");--> statement-breakpoint
CREATE INDEX "helium_movements_at" ON "helium_movements" USING btree ("at");--> statement-breakpoint
CREATE UNIQUE INDEX "helium_postings_once" ON "helium_postings" USING btree ("movement_id","account_id");--> statement-breakpoint
CREATE INDEX "helium_postings_account" ON "helium_postings" USING btree ("account_id");--> statement-breakpoint
CREATE UNIQUE INDEX "invoices_number" ON "invoices" USING btree ("series","year","sequence");--> statement-breakpoint
CREATE UNIQUE INDEX "invoices_one_for_run" ON "invoices" USING btree ("run_id") WHERE kind = 'invoice';--> statement-breakpoint
CREATE INDEX "invoices_group" ON "invoices" USING btree ("group_id");--> statement-breakpoint
CREATE UNIQUE INDEX "payments_attempt" ON "payments" USING btree ("run_id","kind","attempt");--> statement-breakpoint
CREATE UNIQUE INDEX "payments_one_open" ON "payments" USING btree ("run_id","kind") WHERE state in ('open', 'requires-action');--> statement-breakpoint
CREATE INDEX "audit_events_object" ON "audit_events" USING btree ("object_type","object_id");--> statement-breakpoint
CREATE INDEX "group_memberships_person" ON "group_memberships" USING btree ("person_id");--> statement-breakpoint
CREATE UNIQUE INDEX "people_email" ON "people" USING btree (lower("email"));--> statement-breakpoint
CREATE INDEX "sessions_person" ON "sessions" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "analyses_dataset" ON "analyses" USING btree ("dataset_id");--> statement-breakpoint
CREATE INDEX "analysis_comments_analysis" ON "analysis_comments" USING btree ("analysis_id");--> statement-breakpoint
CREATE INDEX "datasets_run" ON "datasets" USING btree ("run_id");--> statement-breakpoint
CREATE UNIQUE INDEX "datasets_once" ON "datasets" USING btree ("run_id","sha256","role");--> statement-breakpoint
CREATE INDEX "sign_offs_analysis" ON "sign_offs" USING btree ("analysis_id");--> statement-breakpoint
CREATE INDEX "run_entries_run_at" ON "run_entries" USING btree ("run_id","at");--> statement-breakpoint
CREATE INDEX "run_transitions_run" ON "run_transitions" USING btree ("run_id");--> statement-breakpoint
CREATE INDEX "runs_cryostat_state" ON "runs" USING btree ("cryostat_id","state");--> statement-breakpoint
CREATE INDEX "runs_group" ON "runs" USING btree ("group_id");--> statement-breakpoint
CREATE INDEX "runs_state" ON "runs" USING btree ("state");--> statement-breakpoint
CREATE INDEX "samples_group" ON "samples" USING btree ("group_id");