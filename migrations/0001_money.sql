CREATE TABLE `leases` (
	`household_id` text PRIMARY KEY NOT NULL,
	`value` text NOT NULL,
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "leases_json" CHECK(json_valid("leases"."value"))
) STRICT;
--> statement-breakpoint
CREATE TABLE `other_loans` (
	`household_id` text NOT NULL,
	`id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`value` text NOT NULL,
	PRIMARY KEY(`household_id`, `id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "other_loans_json" CHECK(json_valid("other_loans"."value"))
) STRICT;
--> statement-breakpoint
CREATE TABLE `scenarios` (
	`household_id` text NOT NULL,
	`id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`value` text NOT NULL,
	PRIMARY KEY(`household_id`, `id`),
	FOREIGN KEY (`household_id`) REFERENCES `households`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "scenarios_json" CHECK(json_valid("scenarios"."value"))
) STRICT;
--> statement-breakpoint
ALTER TABLE `assumptions` ADD `more` text DEFAULT '{}' NOT NULL;--> statement-breakpoint
ALTER TABLE `costs` ADD `every` text;--> statement-breakpoint
ALTER TABLE `costs` ADD `until_day` text;--> statement-breakpoint
ALTER TABLE `credit_costs` ADD `placed_in_service_on` text;--> statement-breakpoint
ALTER TABLE `credit_costs` ADD `document_id` text;--> statement-breakpoint
ALTER TABLE `credit_years` ADD `limit_from` text;--> statement-breakpoint
ALTER TABLE `credit_years` ADD `document_id` text;--> statement-breakpoint
ALTER TABLE `loan_payments` ADD `reamortize` integer DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE `loan_payments` ADD `document_id` text;--> statement-breakpoint
ALTER TABLE `loans` ADD `more` text DEFAULT '{}' NOT NULL;--> statement-breakpoint
ALTER TABLE `mortgages` ADD `more` text DEFAULT '{}' NOT NULL;--> statement-breakpoint
ALTER TABLE `tax_credits` ADD `carried_in` text;