CREATE TABLE `draft_files` (
	`household_id` text NOT NULL,
	`document_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`keep_good_rows` integer NOT NULL,
	`source_table` text NOT NULL,
	`faults` text NOT NULL,
	PRIMARY KEY(`household_id`, `document_id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`household_id`,`document_id`) REFERENCES `documents`(`household_id`,`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "draft_files_keep" CHECK("draft_files"."keep_good_rows" IN (0, 1)),
	CONSTRAINT "draft_files_json" CHECK(json_valid("draft_files"."source_table") AND json_valid("draft_files"."faults"))
) STRICT;
--> statement-breakpoint
CREATE TABLE `draft_readings` (
	`household_id` text NOT NULL,
	`key` text NOT NULL,
	`ordinal` integer NOT NULL,
	`document_id` text NOT NULL,
	`keep_good_rows` integer NOT NULL,
	`channel` text NOT NULL,
	`reading` text NOT NULL,
	PRIMARY KEY(`household_id`, `key`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`household_id`,`document_id`) REFERENCES `documents`(`household_id`,`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "draft_readings_keep" CHECK("draft_readings"."keep_good_rows" IN (0, 1)),
	CONSTRAINT "draft_readings_json" CHECK(json_valid("draft_readings"."reading"))
) STRICT;
--> statement-breakpoint
CREATE TABLE `draft_statements` (
	`household_id` text NOT NULL,
	`key` text NOT NULL,
	`ordinal` integer NOT NULL,
	`document_id` text,
	`first_row` integer,
	`last_row` integer,
	`statement` text NOT NULL,
	`as_read` text,
	PRIMARY KEY(`household_id`, `key`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`household_id`,`document_id`) REFERENCES `documents`(`household_id`,`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "draft_statements_json" CHECK(json_valid("draft_statements"."statement")),
	CONSTRAINT "draft_statements_read" CHECK(("draft_statements"."document_id" IS NULL) = ("draft_statements"."as_read" IS NULL))
) STRICT;
--> statement-breakpoint
CREATE TABLE `assumptions` (
	`household_id` text PRIMARY KEY NOT NULL,
	`degradation` text NOT NULL,
	`price_rise` text NOT NULL,
	`horizon_months` integer NOT NULL,
	`upkeep_yearly_cents` integer NOT NULL,
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "assumptions_rates" CHECK(("assumptions"."degradation" GLOB '[0-9]*' OR "assumptions"."degradation" GLOB '-[0-9]*') AND "assumptions"."degradation" NOT GLOB '*[^0-9.-]*' AND ("assumptions"."price_rise" GLOB '[0-9]*' OR "assumptions"."price_rise" GLOB '-[0-9]*') AND "assumptions"."price_rise" NOT GLOB '*[^0-9.-]*'),
	CONSTRAINT "assumptions_horizon" CHECK("assumptions"."horizon_months" BETWEEN 12 AND 480),
	CONSTRAINT "assumptions_upkeep" CHECK("assumptions"."upkeep_yearly_cents" >= 0)
) STRICT;
--> statement-breakpoint
CREATE TABLE `audit_events` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`household_id` text NOT NULL,
	`at` text NOT NULL,
	`user_id` text NOT NULL,
	`by_name` text NOT NULL,
	`action` text NOT NULL,
	`about` text NOT NULL,
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade
) STRICT;
--> statement-breakpoint
CREATE INDEX `audit_events_household` ON `audit_events` (`household_id`,`id`);--> statement-breakpoint
CREATE TABLE `households` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	`created_at` text NOT NULL,
	`sample` integer DEFAULT false NOT NULL,
	`name` text NOT NULL,
	`place` text NOT NULL,
	`utility` text NOT NULL,
	`time_zone` text NOT NULL,
	`latitude` real,
	`longitude` real,
	`switch_on` text,
	`inverter_ac_watts` integer,
	`expected_monthly_wh` text,
	`opening` text NOT NULL,
	CONSTRAINT "households_version" CHECK("households"."version" >= 1),
	CONSTRAINT "households_sample" CHECK("households"."sample" IN (0, 1)),
	CONSTRAINT "households_switch_on" CHECK("households"."switch_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "households_latitude" CHECK("households"."latitude" BETWEEN -90 AND 90),
	CONSTRAINT "households_longitude" CHECK("households"."longitude" BETWEEN -180 AND 180),
	CONSTRAINT "households_expected" CHECK(json_array_length("households"."expected_monthly_wh") = 12),
	CONSTRAINT "households_opening" CHECK(json_valid("households"."opening"))
) STRICT;
--> statement-breakpoint
CREATE TABLE `meters` (
	`household_id` text NOT NULL,
	`id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`label` text NOT NULL,
	`channels` text NOT NULL,
	`dials` integer NOT NULL,
	`multiplier` text NOT NULL,
	PRIMARY KEY(`household_id`, `id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "meters_channels" CHECK(json_valid("meters"."channels")),
	CONSTRAINT "meters_dials" CHECK("meters"."dials" BETWEEN 3 AND 9),
	CONSTRAINT "meters_multiplier" CHECK(("meters"."multiplier" GLOB '[0-9]*' OR "meters"."multiplier" GLOB '-[0-9]*') AND "meters"."multiplier" NOT GLOB '*[^0-9.-]*')
) STRICT;
--> statement-breakpoint
CREATE TABLE `roof_arrays` (
	`household_id` text NOT NULL,
	`id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`label` text NOT NULL,
	`modules` integer NOT NULL,
	`module_watts` integer NOT NULL,
	`tilt_degrees` integer,
	`facing_degrees` integer,
	PRIMARY KEY(`household_id`, `id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "roof_arrays_modules" CHECK("roof_arrays"."modules" BETWEEN 1 AND 500),
	CONSTRAINT "roof_arrays_watts" CHECK("roof_arrays"."module_watts" BETWEEN 50 AND 1000),
	CONSTRAINT "roof_arrays_tilt" CHECK("roof_arrays"."tilt_degrees" BETWEEN 0 AND 90),
	CONSTRAINT "roof_arrays_facing" CHECK("roof_arrays"."facing_degrees" BETWEEN 0 AND 359)
) STRICT;
--> statement-breakpoint
CREATE TABLE `setup_steps` (
	`household_id` text NOT NULL,
	`step` text NOT NULL,
	`state` text NOT NULL,
	PRIMARY KEY(`household_id`, `step`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "setup_steps_state" CHECK("setup_steps"."state" IN ('done', 'skipped'))
) STRICT;
--> statement-breakpoint
CREATE TABLE `usage_before` (
	`household_id` text NOT NULL,
	`from_day` text NOT NULL,
	`to_day` text NOT NULL,
	`import_wh` integer NOT NULL,
	PRIMARY KEY(`household_id`, `from_day`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "usage_before_days" CHECK("usage_before"."from_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]' AND "usage_before"."to_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]' AND "usage_before"."from_day" < "usage_before"."to_day")
) STRICT;
--> statement-breakpoint
CREATE TABLE `costs` (
	`household_id` text NOT NULL,
	`id` text NOT NULL,
	`on_day` text NOT NULL,
	`kind` text NOT NULL,
	`label` text NOT NULL,
	`amount_cents` integer NOT NULL,
	`document_id` text,
	PRIMARY KEY(`household_id`, `id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`household_id`,`document_id`) REFERENCES `documents`(`household_id`,`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "costs_on" CHECK("costs"."on_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]')
) STRICT;
--> statement-breakpoint
CREATE TABLE `credit_costs` (
	`household_id` text NOT NULL,
	`id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`label` text NOT NULL,
	`amount_cents` integer NOT NULL,
	`treatment` text NOT NULL,
	`reason` text,
	PRIMARY KEY(`household_id`, `id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "credit_costs_amount" CHECK("credit_costs"."amount_cents" >= 0),
	CONSTRAINT "credit_costs_treatment" CHECK("credit_costs"."treatment" IN ('qualified', 'reduction', 'leftOut'))
) STRICT;
--> statement-breakpoint
CREATE TABLE `credit_years` (
	`household_id` text NOT NULL,
	`tax_year` integer NOT NULL,
	`limit_cents` integer,
	`status` text NOT NULL,
	`filed_on` text,
	`refund_on` text,
	`as_refund` integer NOT NULL,
	`typed_by` text,
	PRIMARY KEY(`household_id`, `tax_year`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "credit_years_year" CHECK("credit_years"."tax_year" BETWEEN 2006 AND 2100),
	CONSTRAINT "credit_years_limit" CHECK("credit_years"."limit_cents" >= 0),
	CONSTRAINT "credit_years_status" CHECK("credit_years"."status" IN ('planned', 'filed', 'amended')),
	CONSTRAINT "credit_years_filed" CHECK("credit_years"."filed_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "credit_years_refund" CHECK("credit_years"."refund_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "credit_years_as_refund" CHECK("credit_years"."as_refund" IN (0, 1))
) STRICT;
--> statement-breakpoint
CREATE TABLE `incentive_receipts` (
	`household_id` text NOT NULL,
	`id` text NOT NULL,
	`on_day` text NOT NULL,
	`amount_cents` integer NOT NULL,
	`note` text,
	PRIMARY KEY(`household_id`, `id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "incentive_receipts_on" CHECK("incentive_receipts"."on_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]')
) STRICT;
--> statement-breakpoint
CREATE TABLE `incentives` (
	`household_id` text PRIMARY KEY NOT NULL,
	`payer` text NOT NULL,
	`rate_per_kwh` text NOT NULL,
	`first_day` text NOT NULL,
	`last_day` text NOT NULL,
	`paid_as` text NOT NULL,
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "incentives_rate" CHECK(("incentives"."rate_per_kwh" GLOB '[0-9]*' OR "incentives"."rate_per_kwh" GLOB '-[0-9]*') AND "incentives"."rate_per_kwh" NOT GLOB '*[^0-9.-]*'),
	CONSTRAINT "incentives_days" CHECK("incentives"."first_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]' AND "incentives"."last_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "incentives_paid_as" CHECK("incentives"."paid_as" IN ('separate', 'billCredit'))
) STRICT;
--> statement-breakpoint
CREATE TABLE `loan_payments` (
	`household_id` text NOT NULL,
	`id` text NOT NULL,
	`on_day` text NOT NULL,
	`amount_cents` integer NOT NULL,
	`extra_principal_cents` integer NOT NULL,
	`note` text,
	PRIMARY KEY(`household_id`, `id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "loan_payments_on" CHECK("loan_payments"."on_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]')
) STRICT;
--> statement-breakpoint
CREATE TABLE `loans` (
	`household_id` text PRIMARY KEY NOT NULL,
	`lender` text NOT NULL,
	`principal_cents` integer NOT NULL,
	`dealer_fee_cents` integer NOT NULL,
	`annual_rate` text NOT NULL,
	`term_months` integer NOT NULL,
	`funded_on` text NOT NULL,
	`first_payment_on` text NOT NULL,
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "loans_amounts" CHECK("loans"."principal_cents" >= 1 AND "loans"."dealer_fee_cents" >= 0),
	CONSTRAINT "loans_rate" CHECK(("loans"."annual_rate" GLOB '[0-9]*' OR "loans"."annual_rate" GLOB '-[0-9]*') AND "loans"."annual_rate" NOT GLOB '*[^0-9.-]*'),
	CONSTRAINT "loans_term" CHECK("loans"."term_months" BETWEEN 1 AND 480),
	CONSTRAINT "loans_days" CHECK("loans"."funded_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]' AND "loans"."first_payment_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]')
) STRICT;
--> statement-breakpoint
CREATE TABLE `mortgages` (
	`household_id` text PRIMARY KEY NOT NULL,
	`lender` text NOT NULL,
	`kind` text NOT NULL,
	`principal_cents` integer NOT NULL,
	`annual_rate` text NOT NULL,
	`term_months` integer NOT NULL,
	`first_payment_on` text NOT NULL,
	`original_value_cents` integer NOT NULL,
	`extra_principal_monthly_cents` integer NOT NULL,
	`ended_on` text,
	`premium_monthly_cents` integer,
	`removed_on` text,
	`because_of_roof` integer,
	`end_rule` text,
	`appreciation_on` text,
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "mortgages_kind" CHECK("mortgages"."kind" IN ('conventional', 'fha', 'va')),
	CONSTRAINT "mortgages_amounts" CHECK("mortgages"."principal_cents" >= 1 AND "mortgages"."original_value_cents" >= 1 AND "mortgages"."extra_principal_monthly_cents" >= 0 AND ("mortgages"."premium_monthly_cents" IS NULL OR "mortgages"."premium_monthly_cents" >= 1)),
	CONSTRAINT "mortgages_rate" CHECK(("mortgages"."annual_rate" GLOB '[0-9]*' OR "mortgages"."annual_rate" GLOB '-[0-9]*') AND "mortgages"."annual_rate" NOT GLOB '*[^0-9.-]*'),
	CONSTRAINT "mortgages_term" CHECK("mortgages"."term_months" BETWEEN 1 AND 480),
	CONSTRAINT "mortgages_first" CHECK("mortgages"."first_payment_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "mortgages_ended" CHECK("mortgages"."ended_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "mortgages_removed" CHECK("mortgages"."removed_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "mortgages_appreciation" CHECK("mortgages"."appreciation_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "mortgages_insurance" CHECK(("mortgages"."premium_monthly_cents" IS NULL) = ("mortgages"."end_rule" IS NULL) AND ("mortgages"."premium_monthly_cents" IS NULL) = ("mortgages"."because_of_roof" IS NULL))
) STRICT;
--> statement-breakpoint
CREATE TABLE `rate_plans` (
	`household_id` text NOT NULL,
	`from_day` text NOT NULL,
	`plan` text NOT NULL,
	`without_roof` text,
	PRIMARY KEY(`household_id`, `from_day`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "rate_plans_from" CHECK("rate_plans"."from_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "rate_plans_json" CHECK(json_valid("rate_plans"."plan")),
	CONSTRAINT "rate_plans_without" CHECK("rate_plans"."without_roof" IS NULL OR json_valid("rate_plans"."without_roof"))
) STRICT;
--> statement-breakpoint
CREATE TABLE `tax_credits` (
	`household_id` text PRIMARY KEY NOT NULL,
	`placed_in_service_on` text,
	`home_share` text NOT NULL,
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "tax_credits_placed" CHECK("tax_credits"."placed_in_service_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "tax_credits_share" CHECK(("tax_credits"."home_share" GLOB '[0-9]*' OR "tax_credits"."home_share" GLOB '-[0-9]*') AND "tax_credits"."home_share" NOT GLOB '*[^0-9.-]*')
) STRICT;
--> statement-breakpoint
CREATE TABLE `accepted_differences` (
	`household_id` text NOT NULL,
	`cycle_to` text NOT NULL,
	`check_key` text NOT NULL,
	`note` text NOT NULL,
	`by_name` text NOT NULL,
	`on_day` text NOT NULL,
	PRIMARY KEY(`household_id`, `cycle_to`, `check_key`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "accepted_differences_days" CHECK("accepted_differences"."cycle_to" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]' AND "accepted_differences"."on_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "accepted_differences_note" CHECK(length("accepted_differences"."note") BETWEEN 1 AND 1000)
) STRICT;
--> statement-breakpoint
CREATE TABLE `documents` (
	`household_id` text NOT NULL,
	`id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`state` text NOT NULL,
	`kind` text NOT NULL,
	`file_name` text NOT NULL,
	`sha256` text NOT NULL,
	`size` integer NOT NULL,
	`uploaded_on` text NOT NULL,
	`uploaded_by` text NOT NULL,
	`bytes` blob NOT NULL,
	PRIMARY KEY(`household_id`, `id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "documents_state" CHECK("documents"."state" IN ('held', 'kept')),
	CONSTRAINT "documents_kind" CHECK("documents"."kind" IN ('statement', 'production', 'credit', 'other')),
	CONSTRAINT "documents_hash" CHECK(length("documents"."sha256") = 64 AND "documents"."sha256" NOT GLOB '*[^0-9a-f]*'),
	CONSTRAINT "documents_size" CHECK("documents"."size" = length("documents"."bytes")),
	CONSTRAINT "documents_uploaded_on" CHECK("documents"."uploaded_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]')
) STRICT;
--> statement-breakpoint
CREATE UNIQUE INDEX `documents_sha256` ON `documents` (`household_id`,`sha256`);--> statement-breakpoint
CREATE TABLE `interval_days` (
	`household_id` text NOT NULL,
	`channel` text NOT NULL,
	`day` text NOT NULL,
	`minutes` integer NOT NULL,
	`steps` blob NOT NULL,
	`document_id` text,
	PRIMARY KEY(`household_id`, `channel`, `day`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`household_id`,`document_id`) REFERENCES `documents`(`household_id`,`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "interval_days_channel" CHECK("interval_days"."channel" IN ('production', 'monitor', 'import', 'export')),
	CONSTRAINT "interval_days_day" CHECK("interval_days"."day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "interval_days_minutes" CHECK("interval_days"."minutes" BETWEEN 1 AND 1440),
	CONSTRAINT "interval_days_steps" CHECK(length("interval_days"."steps") % 4 = 0)
) STRICT;
--> statement-breakpoint
CREATE TABLE `rejected_rows` (
	`household_id` text NOT NULL,
	`document_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`row` integer,
	`column_name` text,
	`found` text,
	`reason` text NOT NULL,
	PRIMARY KEY(`household_id`, `document_id`, `ordinal`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`household_id`,`document_id`) REFERENCES `documents`(`household_id`,`id`) ON UPDATE no action ON DELETE cascade
) STRICT;
--> statement-breakpoint
CREATE TABLE `statement_banks` (
	`household_id` text NOT NULL,
	`statement_id` text NOT NULL,
	`revision` integer NOT NULL,
	`ordinal` integer NOT NULL,
	`bank` text NOT NULL,
	`unit` text NOT NULL,
	`open` text,
	`close` text,
	`row` integer,
	PRIMARY KEY(`household_id`, `statement_id`, `revision`, `ordinal`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`household_id`,`statement_id`,`revision`) REFERENCES `statements`(`household_id`,`id`,`revision`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "statement_banks_unit" CHECK("statement_banks"."unit" IN ('kWh', 'USD')),
	CONSTRAINT "statement_banks_open" CHECK(("statement_banks"."open" GLOB '[0-9]*' OR "statement_banks"."open" GLOB '-[0-9]*') AND "statement_banks"."open" NOT GLOB '*[^0-9.-]*'),
	CONSTRAINT "statement_banks_close" CHECK(("statement_banks"."close" GLOB '[0-9]*' OR "statement_banks"."close" GLOB '-[0-9]*') AND "statement_banks"."close" NOT GLOB '*[^0-9.-]*')
) STRICT;
--> statement-breakpoint
CREATE TABLE `statement_lines` (
	`household_id` text NOT NULL,
	`statement_id` text NOT NULL,
	`revision` integer NOT NULL,
	`ordinal` integer NOT NULL,
	`component` text,
	`kind` text NOT NULL,
	`label` text NOT NULL,
	`quantity` text,
	`unit` text,
	`rate` text,
	`amount_cents` integer NOT NULL,
	`in_due` integer NOT NULL,
	`row` integer,
	PRIMARY KEY(`household_id`, `statement_id`, `revision`, `ordinal`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`household_id`,`statement_id`,`revision`) REFERENCES `statements`(`household_id`,`id`,`revision`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "statement_lines_in_due" CHECK("statement_lines"."in_due" IN (0, 1)),
	CONSTRAINT "statement_lines_quantity" CHECK(("statement_lines"."quantity" GLOB '[0-9]*' OR "statement_lines"."quantity" GLOB '-[0-9]*') AND "statement_lines"."quantity" NOT GLOB '*[^0-9.-]*'),
	CONSTRAINT "statement_lines_rate" CHECK(("statement_lines"."rate" GLOB '[0-9]*' OR "statement_lines"."rate" GLOB '-[0-9]*') AND "statement_lines"."rate" NOT GLOB '*[^0-9.-]*')
) STRICT;
--> statement-breakpoint
CREATE TABLE `statement_reads` (
	`household_id` text NOT NULL,
	`statement_id` text NOT NULL,
	`revision` integer NOT NULL,
	`ordinal` integer NOT NULL,
	`meter` text NOT NULL,
	`channel` text NOT NULL,
	`from_day` text NOT NULL,
	`to_day` text NOT NULL,
	`previous` text NOT NULL,
	`current` text NOT NULL,
	`dials` integer NOT NULL,
	`multiplier` text NOT NULL,
	`type` text NOT NULL,
	`row` integer,
	PRIMARY KEY(`household_id`, `statement_id`, `revision`, `ordinal`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`household_id`,`statement_id`,`revision`) REFERENCES `statements`(`household_id`,`id`,`revision`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "statement_reads_channel" CHECK("statement_reads"."channel" IN ('import', 'export', 'production')),
	CONSTRAINT "statement_reads_type" CHECK("statement_reads"."type" IN ('actual', 'estimated')),
	CONSTRAINT "statement_reads_days" CHECK("statement_reads"."from_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]' AND "statement_reads"."to_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
	CONSTRAINT "statement_reads_dials" CHECK("statement_reads"."dials" BETWEEN 3 AND 9),
	CONSTRAINT "statement_reads_values" CHECK(("statement_reads"."previous" GLOB '[0-9]*' OR "statement_reads"."previous" GLOB '-[0-9]*') AND "statement_reads"."previous" NOT GLOB '*[^0-9.-]*' AND ("statement_reads"."current" GLOB '[0-9]*' OR "statement_reads"."current" GLOB '-[0-9]*') AND "statement_reads"."current" NOT GLOB '*[^0-9.-]*' AND ("statement_reads"."multiplier" GLOB '[0-9]*' OR "statement_reads"."multiplier" GLOB '-[0-9]*') AND "statement_reads"."multiplier" NOT GLOB '*[^0-9.-]*')
) STRICT;
--> statement-breakpoint
CREATE TABLE `statements` (
	`household_id` text NOT NULL,
	`id` text NOT NULL,
	`revision` integer NOT NULL,
	`from_day` text NOT NULL,
	`to_day` text NOT NULL,
	`printed_days` integer,
	`statement_on` text,
	`due_on` text,
	`import_wh` integer,
	`export_wh` integer,
	`production_wh` integer,
	`previous_balance_cents` integer,
	`payments_cents` integer,
	`amount_due_cents` integer NOT NULL,
	`source_kind` text NOT NULL,
	`document_id` text,
	`file_name` text,
	`first_row` integer,
	`last_row` integer,
	`typed_by` text,
	`typed_on` text,
	`reason` text,
	`entered_by` text NOT NULL,
	`entered_at` text NOT NULL,
	PRIMARY KEY(`household_id`, `id`, `revision`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`household_id`,`document_id`) REFERENCES `documents`(`household_id`,`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "statements_revision" CHECK("statements"."revision" >= 1),
	CONSTRAINT "statements_days" CHECK("statements"."from_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]' AND "statements"."to_day" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]' AND "statements"."from_day" < "statements"."to_day"),
	CONSTRAINT "statements_dates" CHECK(("statements"."statement_on" IS NULL OR "statements"."statement_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]') AND ("statements"."due_on" IS NULL OR "statements"."due_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]') AND ("statements"."typed_on" IS NULL OR "statements"."typed_on" GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]')),
	CONSTRAINT "statements_source" CHECK(("statements"."source_kind" = 'file' AND "statements"."document_id" IS NOT NULL AND "statements"."file_name" IS NOT NULL AND "statements"."first_row" IS NOT NULL AND "statements"."last_row" IS NOT NULL AND "statements"."typed_by" IS NULL) OR ("statements"."source_kind" = 'typed' AND "statements"."document_id" IS NULL AND "statements"."typed_by" IS NOT NULL AND "statements"."typed_on" IS NOT NULL))
) STRICT;
--> statement-breakpoint
CREATE INDEX `statements_days` ON `statements` (`household_id`,`to_day`);--> statement-breakpoint
CREATE TABLE `app_settings` (
	`name` text PRIMARY KEY NOT NULL,
	`value` text NOT NULL
) STRICT;
--> statement-breakpoint
CREATE TABLE `memberships` (
	`household_id` text NOT NULL,
	`user_id` text NOT NULL,
	`role` text NOT NULL,
	`since` text NOT NULL,
	PRIMARY KEY(`household_id`, `user_id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "memberships_role" CHECK("memberships"."role" IN ('owner', 'member', 'preparer'))
) STRICT;
--> statement-breakpoint
CREATE INDEX `memberships_user` ON `memberships` (`user_id`);--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` text PRIMARY KEY NOT NULL,
	`user_id` text NOT NULL,
	`expires_at` integer NOT NULL,
	`created_at` integer NOT NULL,
	`last_seen_at` integer NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE cascade
) STRICT;
--> statement-breakpoint
CREATE INDEX `sessions_user` ON `sessions` (`user_id`);--> statement-breakpoint
CREATE TABLE `users` (
	`id` text PRIMARY KEY NOT NULL,
	`email` text NOT NULL,
	`name` text NOT NULL,
	`password_hash` text NOT NULL,
	`created_at` text NOT NULL,
	CONSTRAINT "users_email" CHECK("users"."email" = lower("users"."email")),
	CONSTRAINT "users_hash" CHECK("users"."password_hash" GLOB '$argon2id$*')
) STRICT;
--> statement-breakpoint
CREATE UNIQUE INDEX `users_email_unique` ON `users` (`email`);