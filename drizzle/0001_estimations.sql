CREATE TABLE `estimations` (
	`study_id` text NOT NULL,
	`cell_id` text NOT NULL,
	`fingerprint` text NOT NULL,
	`started_at` integer NOT NULL,
	PRIMARY KEY(`study_id`, `cell_id`),
	FOREIGN KEY (`study_id`) REFERENCES `studies`(`id`) ON UPDATE no action ON DELETE cascade
);
