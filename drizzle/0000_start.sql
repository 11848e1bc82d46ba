CREATE TABLE `audit` (
	`seq` integer PRIMARY KEY NOT NULL,
	`at` text NOT NULL,
	`person_id` text,
	`session_id` text,
	`site_id` text,
	`action` text NOT NULL,
	`subject` text NOT NULL,
	`details` text NOT NULL,
	`previous_hash` text NOT NULL,
	`hash` text NOT NULL,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`session_id`) REFERENCES `sessions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "audit_details" CHECK(json_valid(details))
) STRICT;
--> statement-breakpoint
CREATE INDEX `audit_site` ON `audit` (`site_id`);--> statement-breakpoint
CREATE TABLE `case_overrides` (
	`network_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`changed_in` integer NOT NULL,
	`properties` text NOT NULL,
	`case_id` text NOT NULL,
	`node_id` text NOT NULL,
	PRIMARY KEY(`network_id`, `case_id`, `node_id`),
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`network_id`,`case_id`) REFERENCES `cases`(`network_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`network_id`,`node_id`) REFERENCES `nodes`(`network_id`,`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "case_overrides_properties" CHECK(json_valid(properties))
) STRICT;
--> statement-breakpoint
CREATE INDEX `case_overrides_node_id` ON `case_overrides` (`network_id`,`node_id`);--> statement-breakpoint
CREATE TABLE `cases` (
	`network_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`changed_in` integer NOT NULL,
	`properties` text NOT NULL,
	`id` text NOT NULL,
	`name` text NOT NULL,
	PRIMARY KEY(`network_id`, `id`),
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "cases_properties" CHECK(json_valid(properties))
) STRICT;
--> statement-breakpoint
CREATE TABLE `edits` (
	`network_id` text NOT NULL,
	`version` integer NOT NULL,
	`batch_id` text NOT NULL,
	`person_id` text NOT NULL,
	`at` text NOT NULL,
	`label` text NOT NULL,
	`forward` text NOT NULL,
	`inverse` text NOT NULL,
	`solver_hash` text NOT NULL,
	PRIMARY KEY(`network_id`, `version`),
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "edits_forward" CHECK(json_valid(forward)),
	CONSTRAINT "edits_inverse" CHECK(json_valid(inverse))
) STRICT;
--> statement-breakpoint
CREATE UNIQUE INDEX `edits_batch` ON `edits` (`batch_id`);--> statement-breakpoint
CREATE TABLE `gauges` (
	`network_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`changed_in` integer NOT NULL,
	`properties` text NOT NULL,
	`id` text NOT NULL,
	`tag` text,
	`node_id` text,
	`pipe_id` text,
	`distance_m` real,
	PRIMARY KEY(`network_id`, `id`),
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`network_id`,`node_id`) REFERENCES `nodes`(`network_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`network_id`,`pipe_id`) REFERENCES `pipes`(`network_id`,`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "gauges_place" CHECK((node_id is null) <> (pipe_id is null)),
	CONSTRAINT "gauges_properties" CHECK(json_valid(properties))
) STRICT;
--> statement-breakpoint
CREATE TABLE `memberships` (
	`person_id` text NOT NULL,
	`site_id` text NOT NULL,
	`role` text NOT NULL,
	`granted_by` text,
	`granted_at` text NOT NULL,
	PRIMARY KEY(`person_id`, `site_id`),
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`granted_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "memberships_role" CHECK(role in ('viewer', 'commissioning', 'designer', 'reviewer', 'administrator'))
) STRICT;
--> statement-breakpoint
CREATE INDEX `memberships_site` ON `memberships` (`site_id`);--> statement-breakpoint
CREATE TABLE `networks` (
	`id` text PRIMARY KEY NOT NULL,
	`site_id` text NOT NULL,
	`name` text NOT NULL,
	`version` integer NOT NULL,
	`conditions` text NOT NULL,
	`method` text NOT NULL,
	`limits` text NOT NULL,
	`solver_hash` text NOT NULL,
	`created_by` text NOT NULL,
	`created_at` text NOT NULL,
	`archived_at` text,
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`created_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "networks_conditions" CHECK(json_valid(conditions)),
	CONSTRAINT "networks_method" CHECK(json_valid(method)),
	CONSTRAINT "networks_limits" CHECK(json_valid(limits))
) STRICT;
--> statement-breakpoint
CREATE INDEX `networks_site` ON `networks` (`site_id`);--> statement-breakpoint
CREATE TABLE `nodes` (
	`network_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`changed_in` integer NOT NULL,
	`properties` text NOT NULL,
	`id` text NOT NULL,
	`kind` text NOT NULL,
	`tag` text,
	`elevation_m` real NOT NULL,
	`x` real,
	`y` real,
	PRIMARY KEY(`network_id`, `id`),
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "nodes_kind" CHECK(kind in ('trap', 'junction', 'flashVessel', 'pumpedInlet', 'receiver')),
	CONSTRAINT "nodes_properties" CHECK(json_valid(properties))
) STRICT;
--> statement-breakpoint
CREATE TABLE `people` (
	`id` text PRIMARY KEY NOT NULL,
	`email` text NOT NULL,
	`name` text NOT NULL,
	`password_hash` text NOT NULL,
	`password_changed_at` text NOT NULL,
	`units` text NOT NULL,
	`theme` text NOT NULL,
	`time_zone` text NOT NULL,
	`administers_installation` integer DEFAULT false NOT NULL,
	`disabled_at` text,
	`created_at` text NOT NULL,
	CONSTRAINT "people_units" CHECK(units in ('us', 'si')),
	CONSTRAINT "people_theme" CHECK(theme in ('system', 'light', 'dark')),
	CONSTRAINT "people_administers_installation" CHECK(administers_installation in (0, 1))
) STRICT;
--> statement-breakpoint
CREATE UNIQUE INDEX `people_email` ON `people` (lower(email));--> statement-breakpoint
CREATE TABLE `pipes` (
	`network_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`changed_in` integer NOT NULL,
	`properties` text NOT NULL,
	`id` text NOT NULL,
	`tag` text,
	`from_node` text NOT NULL,
	`to_node` text NOT NULL,
	`length_m` real NOT NULL,
	PRIMARY KEY(`network_id`, `id`),
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`network_id`,`from_node`) REFERENCES `nodes`(`network_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`network_id`,`to_node`) REFERENCES `nodes`(`network_id`,`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "pipes_properties" CHECK(json_valid(properties))
) STRICT;
--> statement-breakpoint
CREATE INDEX `pipes_from_node` ON `pipes` (`network_id`,`from_node`);--> statement-breakpoint
CREATE INDEX `pipes_to_node` ON `pipes` (`network_id`,`to_node`);--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` text PRIMARY KEY NOT NULL,
	`person_id` text NOT NULL,
	`created_at` text NOT NULL,
	`seen_at` text NOT NULL,
	`idle_until` text NOT NULL,
	`ends_at` text NOT NULL,
	`ended_at` text,
	`ended_why` text,
	`agent` text NOT NULL,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "sessions_ended_why" CHECK(ended_why in ('signedOut', 'endedByOwner', 'passwordChanged', 'roleChanged', 'disabled', 'expired'))
) STRICT;
--> statement-breakpoint
CREATE INDEX `sessions_person` ON `sessions` (`person_id`);--> statement-breakpoint
CREATE TABLE `sites` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`atmospheric_pressure_pa` real NOT NULL,
	`ambient_temperature_k` real NOT NULL,
	`limits` text NOT NULL,
	`tag_pattern` text,
	`created_at` text NOT NULL,
	CONSTRAINT "sites_limits" CHECK(json_valid(limits))
) STRICT;
--> statement-breakpoint
CREATE TABLE `solve_results` (
	`solve_id` text NOT NULL,
	`case_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`converged` integer NOT NULL,
	`result` text NOT NULL,
	PRIMARY KEY(`solve_id`, `case_id`),
	FOREIGN KEY (`solve_id`) REFERENCES `solves`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "solve_results_converged" CHECK(converged in (0, 1)),
	CONSTRAINT "solve_results_result" CHECK(json_valid(result))
) STRICT;
--> statement-breakpoint
CREATE TABLE `solves` (
	`id` text PRIMARY KEY NOT NULL,
	`network_id` text NOT NULL,
	`solver_hash` text NOT NULL,
	`engine_version` text NOT NULL,
	`state` text NOT NULL,
	`started_at` text NOT NULL,
	`finished_at` text NOT NULL,
	`problem` text,
	`summary` text,
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "solves_state" CHECK(state in ('finished', 'failed')),
	CONSTRAINT "solves_problem" CHECK(json_valid(problem)),
	CONSTRAINT "solves_summary" CHECK(json_valid(summary))
) STRICT;
--> statement-breakpoint
CREATE UNIQUE INDEX `solves_input` ON `solves` (`network_id`,`solver_hash`,`engine_version`);--> statement-breakpoint
CREATE TABLE `trap_models` (
	`network_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`changed_in` integer NOT NULL,
	`properties` text NOT NULL,
	`id` text NOT NULL,
	`name` text NOT NULL,
	`library_id` text,
	`library_version` integer,
	PRIMARY KEY(`network_id`, `id`),
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "trap_models_properties" CHECK(json_valid(properties))
) STRICT;
