CREATE TABLE `one_time_secrets` (
	`person_id` text PRIMARY KEY NOT NULL,
	`sealed_secret` text NOT NULL,
	`created_at` text NOT NULL,
	`confirmed_at` text,
	`last_step` integer,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
) STRICT;
--> statement-breakpoint
CREATE TABLE `recovery_codes` (
	`person_id` text NOT NULL,
	`code_hash` text NOT NULL,
	`created_at` text NOT NULL,
	`used_at` text,
	PRIMARY KEY(`person_id`, `code_hash`),
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
) STRICT;
