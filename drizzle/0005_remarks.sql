CREATE TABLE `remark_replies` (
	`id` text PRIMARY KEY NOT NULL,
	`remark_id` text NOT NULL,
	`author_id` text NOT NULL,
	`text` text NOT NULL,
	`written_at` integer NOT NULL,
	`edited_at` integer,
	FOREIGN KEY (`remark_id`) REFERENCES `remarks`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `remark_replies_remark` ON `remark_replies` (`remark_id`,`written_at`);--> statement-breakpoint
CREATE TABLE `remarks` (
	`id` text PRIMARY KEY NOT NULL,
	`study_id` text NOT NULL,
	`cell_id` text NOT NULL,
	`cell_name` text NOT NULL,
	`anchor` text,
	`author_id` text NOT NULL,
	`text` text NOT NULL,
	`written_at` integer NOT NULL,
	`edited_at` integer,
	`withdrawn_at` integer,
	`settled_by` text,
	`settled_at` integer,
	`reopened_by` text,
	`reopened_at` integer,
	FOREIGN KEY (`study_id`) REFERENCES `studies`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `remarks_study` ON `remarks` (`study_id`,`written_at`);