-- Nothing that a decision rested on is edited in place: corrections are new rows that point at the old.
CREATE TRIGGER `reading_no_update` BEFORE UPDATE ON `reading`
BEGIN
  SELECT RAISE(ABORT, 'A reading is never edited: enter a correction.');
END;
--> statement-breakpoint
CREATE TRIGGER `reading_no_delete` BEFORE DELETE ON `reading`
BEGIN
  SELECT RAISE(ABORT, 'A reading is never edited: enter a correction.');
END;
--> statement-breakpoint
CREATE TRIGGER `pass_no_update` BEFORE UPDATE ON `pass`
BEGIN
  SELECT RAISE(ABORT, 'A pass is never edited: enter a correction.');
END;
--> statement-breakpoint
CREATE TRIGGER `pass_no_delete` BEFORE DELETE ON `pass`
BEGIN
  SELECT RAISE(ABORT, 'A pass is never edited: enter a correction.');
END;
--> statement-breakpoint
CREATE TRIGGER `suggestion_no_update` BEFORE UPDATE ON `suggestion`
BEGIN
  SELECT RAISE(ABORT, 'A suggestion is never edited.');
END;
--> statement-breakpoint
CREATE TRIGGER `suggestion_no_delete` BEFORE DELETE ON `suggestion`
BEGIN
  SELECT RAISE(ABORT, 'A suggestion is never edited.');
END;
--> statement-breakpoint
CREATE TRIGGER `own_estimate_no_update` BEFORE UPDATE ON `own_estimate`
BEGIN
  SELECT RAISE(ABORT, 'An own estimate is never edited.');
END;
--> statement-breakpoint
CREATE TRIGGER `own_estimate_no_delete` BEFORE DELETE ON `own_estimate`
BEGIN
  SELECT RAISE(ABORT, 'An own estimate is never edited.');
END;
--> statement-breakpoint
CREATE TRIGGER `decision_no_update` BEFORE UPDATE ON `decision`
BEGIN
  SELECT RAISE(ABORT, 'A decision is never edited.');
END;
--> statement-breakpoint
CREATE TRIGGER `decision_no_delete` BEFORE DELETE ON `decision`
BEGIN
  SELECT RAISE(ABORT, 'A decision is never edited.');
END;
--> statement-breakpoint
CREATE TRIGGER `launch_sheet_no_update` BEFORE UPDATE ON `launch_sheet`
BEGIN
  SELECT RAISE(ABORT, 'A launch sheet is never edited: publish a newer version.');
END;
--> statement-breakpoint
CREATE TRIGGER `launch_sheet_no_delete` BEFORE DELETE ON `launch_sheet`
BEGIN
  SELECT RAISE(ABORT, 'A launch sheet is never edited: publish a newer version.');
END;
--> statement-breakpoint
CREATE TRIGGER `launch_sheet_seen_no_update` BEFORE UPDATE ON `launch_sheet_seen`
BEGIN
  SELECT RAISE(ABORT, 'A seen mark is never edited.');
END;
--> statement-breakpoint
CREATE TRIGGER `launch_sheet_seen_no_delete` BEFORE DELETE ON `launch_sheet_seen`
BEGIN
  SELECT RAISE(ABORT, 'A seen mark is never edited.');
END;
--> statement-breakpoint
CREATE TRIGGER `service_record_no_update` BEFORE UPDATE ON `service_record`
BEGIN
  SELECT RAISE(ABORT, 'A service record is never edited: enter a correction.');
END;
--> statement-breakpoint
CREATE TRIGGER `service_record_no_delete` BEFORE DELETE ON `service_record`
BEGIN
  SELECT RAISE(ABORT, 'A service record is never edited: enter a correction.');
END;
--> statement-breakpoint
CREATE TRIGGER `checklist_signoff_no_update` BEFORE UPDATE ON `checklist_signoff`
BEGIN
  SELECT RAISE(ABORT, 'A sign-off is never edited.');
END;
--> statement-breakpoint
CREATE TRIGGER `checklist_signoff_no_delete` BEFORE DELETE ON `checklist_signoff`
BEGIN
  SELECT RAISE(ABORT, 'A sign-off is never edited.');
END;
--> statement-breakpoint
CREATE TRIGGER `audit_event_no_update` BEFORE UPDATE ON `audit_event`
BEGIN
  SELECT RAISE(ABORT, 'The audit is append only.');
END;
--> statement-breakpoint
CREATE TRIGGER `audit_event_no_delete` BEFORE DELETE ON `audit_event`
BEGIN
  SELECT RAISE(ABORT, 'The audit is append only.');
END;
