ALTER TABLE `households` ADD `aggregation` text DEFAULT 'none' NOT NULL;--> statement-breakpoint
ALTER TABLE `meters` ADD `service_point` text;--> statement-breakpoint
ALTER TABLE `statement_banks` ADD `sent_out` text;--> statement-breakpoint
ALTER TABLE `statement_banks` ADD `sent_value_cents` integer;--> statement-breakpoint
ALTER TABLE `statements` ADD `budget_cents` integer;--> statement-breakpoint
ALTER TABLE `statements` ADD `budget_balance_cents` integer;--> statement-breakpoint
ALTER TABLE `statements` ADD `budget_settled_cents` integer;