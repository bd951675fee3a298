CREATE TRIGGER ticket_events_keep_update BEFORE UPDATE ON ticket_events FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'ticket_events is append-only';
--> statement-breakpoint
CREATE TRIGGER ticket_events_keep_delete BEFORE DELETE ON ticket_events FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'ticket_events is append-only';
--> statement-breakpoint
CREATE TRIGGER audit_keep_update BEFORE UPDATE ON audit FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'audit is append-only';
--> statement-breakpoint
CREATE TRIGGER audit_keep_delete BEFORE DELETE ON audit FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'audit is append-only';
--> statement-breakpoint
CREATE TRIGGER fault_revisions_keep_update BEFORE UPDATE ON fault_revisions FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'fault_revisions is append-only';
--> statement-breakpoint
CREATE TRIGGER fault_steps_keep_update BEFORE UPDATE ON fault_steps FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'fault_steps is append-only';
--> statement-breakpoint
INSERT INTO revisions (name, value) VALUES ('faults', 0);
