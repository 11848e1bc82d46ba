CREATE TABLE `files` (
	`id` text PRIMARY KEY NOT NULL,
	`site_id` text NOT NULL,
	`purpose` text NOT NULL,
	`name` text NOT NULL,
	`media_type` text NOT NULL,
	`size_bytes` integer NOT NULL,
	`sha256` text NOT NULL,
	`content` blob NOT NULL,
	`created_by` text NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`created_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "files_purpose" CHECK(purpose in ('plan')),
	CONSTRAINT "files_media_type" CHECK(media_type in ('image/png', 'image/jpeg')),
	CONSTRAINT "files_size_bytes" CHECK(size_bytes = length(content))
) STRICT;
--> statement-breakpoint
CREATE INDEX `files_site` ON `files` (`site_id`);--> statement-breakpoint
CREATE TABLE `plans` (
	`network_id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`file_id` text,
	`x` real NOT NULL,
	`y` real NOT NULL,
	`units_per_pixel` real NOT NULL,
	`metres_per_unit` real,
	`opacity` real NOT NULL,
	`width_px` integer NOT NULL,
	`height_px` integer NOT NULL,
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`file_id`) REFERENCES `files`(`id`) ON UPDATE no action ON DELETE no action
) STRICT;
