-- The record's promise, held by the database itself: entries and the audit log are only ever added to.
-- A later migration that rebuilds one of these tables must create its triggers again; tests/db/append-only.test.ts fails otherwise.
CREATE TRIGGER airway_events_no_update BEFORE UPDATE ON airway_events BEGIN SELECT RAISE(ABORT, 'airway_events is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER airway_events_no_delete BEFORE DELETE ON airway_events BEGIN SELECT RAISE(ABORT, 'airway_events is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER settings_no_update BEFORE UPDATE ON settings BEGIN SELECT RAISE(ABORT, 'settings is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER settings_no_delete BEFORE DELETE ON settings BEGIN SELECT RAISE(ABORT, 'settings is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER gases_no_update BEFORE UPDATE ON gases BEGIN SELECT RAISE(ABORT, 'gases is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER gases_no_delete BEFORE DELETE ON gases BEGIN SELECT RAISE(ABORT, 'gases is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER screens_no_update BEFORE UPDATE ON screens BEGIN SELECT RAISE(ABORT, 'screens is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER screens_no_delete BEFORE DELETE ON screens BEGIN SELECT RAISE(ABORT, 'screens is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER holds_no_update BEFORE UPDATE ON holds BEGIN SELECT RAISE(ABORT, 'holds is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER holds_no_delete BEFORE DELETE ON holds BEGIN SELECT RAISE(ABORT, 'holds is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER hold_observations_no_update BEFORE UPDATE ON hold_observations BEGIN SELECT RAISE(ABORT, 'hold_observations is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER hold_observations_no_delete BEFORE DELETE ON hold_observations BEGIN SELECT RAISE(ABORT, 'hold_observations is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER hold_ends_no_update BEFORE UPDATE ON hold_ends BEGIN SELECT RAISE(ABORT, 'hold_ends is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER hold_ends_no_delete BEFORE DELETE ON hold_ends BEGIN SELECT RAISE(ABORT, 'hold_ends is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER trials_no_update BEFORE UPDATE ON trials BEGIN SELECT RAISE(ABORT, 'trials is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER trials_no_delete BEFORE DELETE ON trials BEGIN SELECT RAISE(ABORT, 'trials is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER trial_observations_no_update BEFORE UPDATE ON trial_observations BEGIN SELECT RAISE(ABORT, 'trial_observations is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER trial_observations_no_delete BEFORE DELETE ON trial_observations BEGIN SELECT RAISE(ABORT, 'trial_observations is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER trial_ends_no_update BEFORE UPDATE ON trial_ends BEGIN SELECT RAISE(ABORT, 'trial_ends is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER trial_ends_no_delete BEFORE DELETE ON trial_ends BEGIN SELECT RAISE(ABORT, 'trial_ends is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER decisions_no_update BEFORE UPDATE ON decisions BEGIN SELECT RAISE(ABORT, 'decisions is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER decisions_no_delete BEFORE DELETE ON decisions BEGIN SELECT RAISE(ABORT, 'decisions is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER audit_log_no_update BEFORE UPDATE ON audit_log BEGIN SELECT RAISE(ABORT, 'audit_log is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER audit_log_no_delete BEFORE DELETE ON audit_log BEGIN SELECT RAISE(ABORT, 'audit_log is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER idempotency_keys_no_update BEFORE UPDATE ON idempotency_keys BEGIN SELECT RAISE(ABORT, 'idempotency_keys is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER idempotency_keys_no_delete BEFORE DELETE ON idempotency_keys BEGIN SELECT RAISE(ABORT, 'idempotency_keys is append-only'); END;
--> statement-breakpoint
CREATE TRIGGER protocol_versions_fixed BEFORE UPDATE ON protocol_versions WHEN OLD.approved_at IS NOT NULL OR OLD.is_default = 1 BEGIN SELECT RAISE(ABORT, 'an approved protocol version is fixed'); END;
--> statement-breakpoint
CREATE TRIGGER protocol_versions_no_delete BEFORE DELETE ON protocol_versions BEGIN SELECT RAISE(ABORT, 'a protocol version is never deleted'); END;
