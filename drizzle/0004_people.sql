CREATE TABLE `address_links` (
	`token_hash` text PRIMARY KEY NOT NULL,
	`email` text NOT NULL,
	`user_id` text,
	`expires_at` integer NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `address_links_email` ON `address_links` (`email`);--> statement-breakpoint
CREATE TABLE `invitations` (
	`id` text PRIMARY KEY NOT NULL,
	`study_id` text NOT NULL,
	`email` text NOT NULL,
	`role` text NOT NULL,
	`token_hash` text NOT NULL,
	`invited_by` text NOT NULL,
	`invited_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	FOREIGN KEY (`study_id`) REFERENCES `studies`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `invitations_token_hash_unique` ON `invitations` (`token_hash`);--> statement-breakpoint
CREATE INDEX `invitations_study` ON `invitations` (`study_id`);--> statement-breakpoint
CREATE INDEX `invitations_email` ON `invitations` (`email`);--> statement-breakpoint
CREATE TABLE `journal` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`at` integer NOT NULL,
	`study_id` text,
	`actor_id` text,
	`action` text NOT NULL,
	`subject` text
);
--> statement-breakpoint
CREATE INDEX `journal_study` ON `journal` (`study_id`,`id`);--> statement-breakpoint
CREATE TABLE `mails` (
	`id` text PRIMARY KEY NOT NULL,
	`recipient` text NOT NULL,
	`subject` text NOT NULL,
	`words` text,
	`state` text NOT NULL,
	`written_at` integer NOT NULL,
	`attempts` integer DEFAULT 0 NOT NULL,
	`next_at` integer,
	`settled_at` integer,
	`fault` text
);
--> statement-breakpoint
CREATE INDEX `mails_next` ON `mails` (`state`,`next_at`);--> statement-breakpoint
CREATE INDEX `mails_written` ON `mails` (`written_at`);--> statement-breakpoint
ALTER TABLE `studies` ADD `deleted_at` integer;--> statement-breakpoint
ALTER TABLE `study_members` ADD `put_away_at` integer;--> statement-breakpoint
CREATE TRIGGER `journal_is_never_changed` BEFORE UPDATE ON `journal` BEGIN SELECT RAISE(ABORT, 'the journal is added to, never changed'); END;
