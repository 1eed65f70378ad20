ALTER TABLE `incentive_receipts` ADD `from_day` text;--> statement-breakpoint
ALTER TABLE `incentive_receipts` ADD `to_day` text;--> statement-breakpoint
ALTER TABLE `incentive_receipts` ADD `quantity_wh` integer;