CREATE TABLE `cell_sittings` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`study_id` text NOT NULL,
	`cell_id` text NOT NULL,
	`people` text NOT NULL,
	`started_at` integer NOT NULL,
	`ended_at` integer NOT NULL,
	`before` text,
	FOREIGN KEY (`study_id`) REFERENCES `studies`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `cell_sittings_study` ON `cell_sittings` (`study_id`,`id`);--> statement-breakpoint
CREATE INDEX `cell_sittings_cell` ON `cell_sittings` (`study_id`,`cell_id`,`id`);--> statement-breakpoint
CREATE TABLE `checkpoints` (
	`id` text PRIMARY KEY NOT NULL,
	`study_id` text NOT NULL,
	`name` text NOT NULL,
	`note` text NOT NULL,
	`occasion` text NOT NULL,
	`made_by` text NOT NULL,
	`made_at` integer NOT NULL,
	`title` text NOT NULL,
	`lede` text NOT NULL,
	`cells` text NOT NULL,
	`cell_count` integer NOT NULL,
	`size` integer NOT NULL,
	FOREIGN KEY (`study_id`) REFERENCES `studies`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `checkpoints_study` ON `checkpoints` (`study_id`,`made_at`);