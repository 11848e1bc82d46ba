CREATE TABLE `comments` (
	`id` text PRIMARY KEY NOT NULL,
	`network_id` text NOT NULL,
	`revision_id` text,
	`thread_id` text NOT NULL,
	`subject` text NOT NULL,
	`person_id` text NOT NULL,
	`at` text NOT NULL,
	`body` text NOT NULL,
	`mentions` text NOT NULL,
	`resolved_by` text,
	`resolved_at` text,
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`revision_id`) REFERENCES `revisions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`resolved_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "comments_subject" CHECK(json_valid(subject)),
	CONSTRAINT "comments_mentions" CHECK(json_valid(mentions))
) STRICT;
--> statement-breakpoint
CREATE INDEX `comments_network` ON `comments` (`network_id`,`revision_id`);--> statement-breakpoint
CREATE INDEX `comments_thread` ON `comments` (`thread_id`);--> statement-breakpoint
CREATE TABLE `declined_mails` (
	`person_id` text NOT NULL,
	`purpose` text NOT NULL,
	PRIMARY KEY(`person_id`, `purpose`),
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "declined_mails_purpose" CHECK(purpose in ('submitted', 'returned', 'approved', 'mention', 'comment'))
) STRICT;
--> statement-breakpoint
CREATE TABLE `jobs` (
	`id` text PRIMARY KEY NOT NULL,
	`kind` text NOT NULL,
	`site_id` text NOT NULL,
	`network_id` text NOT NULL,
	`person_id` text NOT NULL,
	`input` text NOT NULL,
	`state` text NOT NULL,
	`progress` real NOT NULL,
	`doing` text NOT NULL,
	`attempt` integer NOT NULL,
	`created_at` text NOT NULL,
	`started_at` text,
	`finished_at` text,
	`problem` text,
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "jobs_kind" CHECK(kind in ('report')),
	CONSTRAINT "jobs_state" CHECK(state in ('waiting', 'running', 'finished', 'failed', 'cancelled')),
	CONSTRAINT "jobs_input" CHECK(json_valid(input)),
	CONSTRAINT "jobs_problem" CHECK(json_valid(problem))
) STRICT;
--> statement-breakpoint
CREATE INDEX `jobs_network` ON `jobs` (`network_id`,`created_at`);--> statement-breakpoint
CREATE INDEX `jobs_state` ON `jobs` (`state`);--> statement-breakpoint
CREATE TABLE `mails` (
	`id` text PRIMARY KEY NOT NULL,
	`purpose` text NOT NULL,
	`site_id` text,
	`recipient_id` text,
	`email` text NOT NULL,
	`data` text NOT NULL,
	`state` text NOT NULL,
	`attempts` integer NOT NULL,
	`next_try_at` text NOT NULL,
	`created_at` text NOT NULL,
	`sent_at` text,
	`last_error` text,
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`recipient_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "mails_purpose" CHECK(purpose in ('invitation', 'passwordReset', 'submitted', 'returned', 'approved', 'mention', 'comment')),
	CONSTRAINT "mails_state" CHECK(state in ('waiting', 'sent', 'givenUp')),
	CONSTRAINT "mails_data" CHECK(json_valid(data))
) STRICT;
--> statement-breakpoint
CREATE INDEX `mails_due` ON `mails` (`state`,`next_try_at`);--> statement-breakpoint
CREATE INDEX `mails_site` ON `mails` (`site_id`,`created_at`);--> statement-breakpoint
CREATE TABLE `one_time_links` (
	`id` text PRIMARY KEY NOT NULL,
	`token_hash` text NOT NULL,
	`purpose` text NOT NULL,
	`email` text NOT NULL,
	`site_id` text,
	`role` text,
	`made_by` text,
	`made_at` text NOT NULL,
	`expires_at` text NOT NULL,
	`used_at` text,
	`withdrawn_at` text,
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`made_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "one_time_links_purpose" CHECK(purpose in ('invitation', 'passwordReset')),
	CONSTRAINT "one_time_links_role" CHECK(role in ('viewer', 'commissioning', 'designer', 'reviewer', 'administrator'))
) STRICT;
--> statement-breakpoint
CREATE UNIQUE INDEX `one_time_links_token` ON `one_time_links` (`token_hash`);--> statement-breakpoint
CREATE INDEX `one_time_links_site` ON `one_time_links` (`site_id`);--> statement-breakpoint
CREATE TABLE `report_files` (
	`job_id` text PRIMARY KEY NOT NULL,
	`format` text NOT NULL,
	`name` text NOT NULL,
	`sha256` text NOT NULL,
	`content` blob NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`job_id`) REFERENCES `jobs`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "report_files_format" CHECK(format in ('pdf', 'xlsx', 'csv', 'json'))
) STRICT;
--> statement-breakpoint
CREATE TABLE `revision_events` (
	`revision_id` text NOT NULL,
	`seq` integer NOT NULL,
	`state` text NOT NULL,
	`person_id` text NOT NULL,
	`at` text NOT NULL,
	`note` text NOT NULL,
	PRIMARY KEY(`revision_id`, `seq`),
	FOREIGN KEY (`revision_id`) REFERENCES `revisions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "revision_events_state" CHECK(state in ('draft', 'underReview', 'returned', 'approved', 'superseded', 'withdrawn'))
) STRICT;
--> statement-breakpoint
CREATE TABLE `revision_results` (
	`revision_id` text NOT NULL,
	`case_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`result` text NOT NULL,
	PRIMARY KEY(`revision_id`, `case_id`),
	FOREIGN KEY (`revision_id`) REFERENCES `revisions`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "revision_results_result" CHECK(json_valid(result))
) STRICT;
--> statement-breakpoint
CREATE TABLE `revisions` (
	`id` text PRIMARY KEY NOT NULL,
	`network_id` text NOT NULL,
	`letter` text NOT NULL,
	`title` text NOT NULL,
	`reason` text NOT NULL,
	`network_version` integer NOT NULL,
	`file` text NOT NULL,
	`file_hash` text NOT NULL,
	`solver_hash` text NOT NULL,
	`results_hash` text NOT NULL,
	`engine_version` text NOT NULL,
	`created_by` text NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`network_id`) REFERENCES `networks`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`created_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`network_id`,`network_version`) REFERENCES `edits`(`network_id`,`version`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "revisions_file" CHECK(json_valid(file))
) STRICT;
--> statement-breakpoint
CREATE UNIQUE INDEX `revisions_letter` ON `revisions` (`network_id`,`letter`);--> statement-breakpoint
CREATE TABLE `signatures` (
	`revision_id` text NOT NULL,
	`seq` integer NOT NULL,
	`person_id` text NOT NULL,
	`meaning` text NOT NULL,
	`statement` text NOT NULL,
	`statement_hash` text NOT NULL,
	`audit_head` text NOT NULL,
	`signature` text NOT NULL,
	`key_id` text NOT NULL,
	PRIMARY KEY(`revision_id`, `seq`),
	FOREIGN KEY (`revision_id`) REFERENCES `revisions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "signatures_meaning" CHECK(meaning in ('reviewed', 'approved')),
	CONSTRAINT "signatures_statement" CHECK(json_valid(statement))
) STRICT;
--> statement-breakpoint
CREATE TRIGGER `revisions_no_update` BEFORE UPDATE ON `revisions`
BEGIN
	SELECT RAISE(ABORT, 'a revision is never changed');
END;
--> statement-breakpoint
CREATE TRIGGER `revisions_no_delete` BEFORE DELETE ON `revisions`
BEGIN
	SELECT RAISE(ABORT, 'a revision is never deleted');
END;
--> statement-breakpoint
CREATE TRIGGER `revision_results_no_update` BEFORE UPDATE ON `revision_results`
BEGIN
	SELECT RAISE(ABORT, 'the results of a revision are never changed');
END;
--> statement-breakpoint
CREATE TRIGGER `revision_results_no_delete` BEFORE DELETE ON `revision_results`
BEGIN
	SELECT RAISE(ABORT, 'the results of a revision are never deleted');
END;
--> statement-breakpoint
CREATE TRIGGER `revision_events_no_update` BEFORE UPDATE ON `revision_events`
BEGIN
	SELECT RAISE(ABORT, 'what became of a revision is never changed');
END;
--> statement-breakpoint
CREATE TRIGGER `revision_events_no_delete` BEFORE DELETE ON `revision_events`
BEGIN
	SELECT RAISE(ABORT, 'what became of a revision is never deleted');
END;
--> statement-breakpoint
CREATE TRIGGER `signatures_no_update` BEFORE UPDATE ON `signatures`
BEGIN
	SELECT RAISE(ABORT, 'signatures are never changed');
END;
--> statement-breakpoint
CREATE TRIGGER `signatures_no_delete` BEFORE DELETE ON `signatures`
BEGIN
	SELECT RAISE(ABORT, 'signatures are never deleted');
END;
