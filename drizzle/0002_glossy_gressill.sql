ALTER TABLE `cell_findings` ADD `upload_sha256` text;--> statement-breakpoint
ALTER TABLE `uploads` ADD `version` integer DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE `uploads` ADD `file_name` text;--> statement-breakpoint
ALTER TABLE `uploads` ADD `format` text DEFAULT 'csv' NOT NULL;--> statement-breakpoint
ALTER TABLE `uploads` ADD `sheet` text;--> statement-breakpoint
ALTER TABLE `uploads` ADD `sheets` text;