ALTER TABLE `referee_copies` ADD `also` text DEFAULT '[]' NOT NULL;--> statement-breakpoint
ALTER TABLE `referee_copies` ADD `expires_at` integer;--> statement-breakpoint
ALTER TABLE `referee_copies` ADD `replaced_by` text;