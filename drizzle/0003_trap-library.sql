CREATE TABLE `library_models` (
	`site_id` text NOT NULL,
	`id` text NOT NULL,
	`version` integer NOT NULL,
	`name` text NOT NULL,
	`properties` text NOT NULL,
	`created_by` text NOT NULL,
	`created_at` text NOT NULL,
	PRIMARY KEY(`site_id`, `id`, `version`),
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`created_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "library_models_properties" CHECK(json_valid(properties))
) STRICT;
--> statement-breakpoint
CREATE TRIGGER `library_models_no_update` BEFORE UPDATE ON `library_models`
BEGIN
	SELECT RAISE(ABORT, 'versions of a library model are never changed');
END;
--> statement-breakpoint
CREATE TRIGGER `library_models_no_delete` BEFORE DELETE ON `library_models`
BEGIN
	SELECT RAISE(ABORT, 'versions of a library model are never deleted');
END;
