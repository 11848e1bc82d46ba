CREATE TABLE `reading_photos` (
	`id` text PRIMARY KEY NOT NULL,
	`reading_id` text NOT NULL,
	`media_type` text NOT NULL,
	`sha256` text NOT NULL,
	`content` blob NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`reading_id`) REFERENCES `readings`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "reading_photos_media_type" CHECK(media_type in ('image/png', 'image/jpeg'))
) STRICT;
--> statement-breakpoint
CREATE INDEX `reading_photos_reading` ON `reading_photos` (`reading_id`);--> statement-breakpoint
CREATE TABLE `readings` (
	`id` text PRIMARY KEY NOT NULL,
	`round_id` text NOT NULL,
	`gauge_id` text NOT NULL,
	`gauge` text NOT NULL,
	`value_pa` real,
	`why_not` text,
	`note` text NOT NULL,
	`taken_at` text NOT NULL,
	`received_at` text NOT NULL,
	`device_id` text NOT NULL,
	`device_seq` integer NOT NULL,
	`replaces` text,
	`person_id` text NOT NULL,
	FOREIGN KEY (`round_id`) REFERENCES `rounds`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`replaces`) REFERENCES `readings`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "readings_value" CHECK((value_pa is null) <> (why_not is null)),
	CONSTRAINT "readings_why_not" CHECK(why_not in ('noAccess', 'unsafe', 'notFound', 'shutOff', 'broken', 'other')),
	CONSTRAINT "readings_gauge" CHECK(json_valid(gauge))
) STRICT;
--> statement-breakpoint
CREATE UNIQUE INDEX `readings_device` ON `readings` (`device_id`,`device_seq`);--> statement-breakpoint
CREATE UNIQUE INDEX `readings_replaces` ON `readings` (`replaces`);--> statement-breakpoint
CREATE INDEX `readings_round` ON `readings` (`round_id`);--> statement-breakpoint
CREATE TABLE `rounds` (
	`id` text PRIMARY KEY NOT NULL,
	`network_id` text NOT NULL,
	`network_version` integer NOT NULL,
	`case_id` text NOT NULL,
	`title` text NOT NULL,
	`person_id` text NOT NULL,
	`started_at` text NOT NULL,
	`closed_at` text,
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`network_id`,`network_version`) REFERENCES `edits`(`network_id`,`version`) ON UPDATE no action ON DELETE no action
) STRICT;
--> statement-breakpoint
CREATE INDEX `rounds_network` ON `rounds` (`network_id`,`started_at`);
--> statement-breakpoint
CREATE TRIGGER `rounds_update` BEFORE UPDATE ON `rounds`
WHEN OLD.`closed_at` IS NOT NULL OR NEW.`closed_at` IS NULL
	OR (NEW.`id`, NEW.`network_id`, NEW.`network_version`, NEW.`case_id`, NEW.`title`, NEW.`person_id`, NEW.`started_at`)
	IS NOT (OLD.`id`, OLD.`network_id`, OLD.`network_version`, OLD.`case_id`, OLD.`title`, OLD.`person_id`, OLD.`started_at`)
BEGIN
	SELECT RAISE(ABORT, 'a round is closed once and otherwise never changed');
END;
--> statement-breakpoint
CREATE TRIGGER `rounds_no_delete` BEFORE DELETE ON `rounds`
BEGIN
	SELECT RAISE(ABORT, 'rounds are never deleted');
END;
--> statement-breakpoint
CREATE TRIGGER `readings_no_update` BEFORE UPDATE ON `readings`
BEGIN
	SELECT RAISE(ABORT, 'readings are never changed');
END;
--> statement-breakpoint
CREATE TRIGGER `readings_no_delete` BEFORE DELETE ON `readings`
BEGIN
	SELECT RAISE(ABORT, 'readings are never deleted');
END;
--> statement-breakpoint
CREATE TRIGGER `reading_photos_no_update` BEFORE UPDATE ON `reading_photos`
BEGIN
	SELECT RAISE(ABORT, 'photographs of readings are never changed');
END;
--> statement-breakpoint
CREATE TRIGGER `reading_photos_no_delete` BEFORE DELETE ON `reading_photos`
BEGIN
	SELECT RAISE(ABORT, 'photographs of readings are never deleted');
END;
