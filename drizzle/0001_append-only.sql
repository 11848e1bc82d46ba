CREATE TRIGGER `audit_no_update` BEFORE UPDATE ON `audit`
BEGIN
	SELECT RAISE(ABORT, 'audit rows are never changed');
END;
--> statement-breakpoint
CREATE TRIGGER `audit_no_delete` BEFORE DELETE ON `audit`
BEGIN
	SELECT RAISE(ABORT, 'audit rows are never deleted');
END;
--> statement-breakpoint
CREATE TRIGGER `edits_no_update` BEFORE UPDATE ON `edits`
BEGIN
	SELECT RAISE(ABORT, 'accepted edits are never changed');
END;
--> statement-breakpoint
CREATE TRIGGER `edits_no_delete` BEFORE DELETE ON `edits`
BEGIN
	SELECT RAISE(ABORT, 'accepted edits are never deleted');
END;
