CREATE TABLE `airway_events` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`event` text NOT NULL,
	`reason` text,
	`support_after` text,
	FOREIGN KEY (`supersedes_id`) REFERENCES `airway_events`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `airway_events_supersedes_id_unique` ON `airway_events` (`supersedes_id`);--> statement-breakpoint
CREATE INDEX `airway_events_episode` ON `airway_events` (`episode_id`,`observed_at`);--> statement-breakpoint
CREATE INDEX `airway_events_unit` ON `airway_events` (`unit_id`,`observed_at`);--> statement-breakpoint
CREATE TABLE `audit_log` (
	`seq` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`at` integer NOT NULL,
	`actor_kind` text NOT NULL,
	`actor_id` text,
	`action` text NOT NULL,
	`unit_id` text,
	`subject_kind` text,
	`subject_id` text,
	`request_id` text NOT NULL,
	`before` text,
	`after` text,
	`previous_hash` text NOT NULL,
	`hash` text NOT NULL
);
--> statement-breakpoint
CREATE INDEX `audit_log_subject` ON `audit_log` (`subject_id`);--> statement-breakpoint
CREATE INDEX `audit_log_unit` ON `audit_log` (`unit_id`,`seq`);--> statement-breakpoint
CREATE TABLE `idempotency_keys` (
	`key` text PRIMARY KEY NOT NULL,
	`person_id` text NOT NULL,
	`action` text NOT NULL,
	`input_hash` text NOT NULL,
	`answer` text NOT NULL,
	`created_at` integer NOT NULL
);
--> statement-breakpoint
CREATE TABLE `account` (
	`id` text PRIMARY KEY NOT NULL,
	`account_id` text NOT NULL,
	`provider_id` text NOT NULL,
	`user_id` text NOT NULL,
	`access_token` text,
	`refresh_token` text,
	`id_token` text,
	`access_token_expires_at` integer,
	`refresh_token_expires_at` integer,
	`scope` text,
	`password` text,
	`created_at` integer DEFAULT (cast(unixepoch('subsecond') * 1000 as integer)) NOT NULL,
	`updated_at` integer DEFAULT (cast(unixepoch('subsecond') * 1000 as integer)) NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `account_user` ON `account` (`user_id`);--> statement-breakpoint
CREATE TABLE `rate_limit` (
	`id` text PRIMARY KEY NOT NULL,
	`key` text NOT NULL,
	`count` integer NOT NULL,
	`last_request` integer NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `rate_limit_key_unique` ON `rate_limit` (`key`);--> statement-breakpoint
CREATE TABLE `session` (
	`id` text PRIMARY KEY NOT NULL,
	`expires_at` integer NOT NULL,
	`token` text NOT NULL,
	`created_at` integer DEFAULT (cast(unixepoch('subsecond') * 1000 as integer)) NOT NULL,
	`updated_at` integer DEFAULT (cast(unixepoch('subsecond') * 1000 as integer)) NOT NULL,
	`ip_address` text,
	`user_agent` text,
	`user_id` text NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `session_token_unique` ON `session` (`token`);--> statement-breakpoint
CREATE INDEX `session_user` ON `session` (`user_id`);--> statement-breakpoint
CREATE TABLE `user` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`email` text NOT NULL,
	`email_verified` integer DEFAULT false NOT NULL,
	`image` text,
	`created_at` integer DEFAULT (cast(unixepoch('subsecond') * 1000 as integer)) NOT NULL,
	`updated_at` integer DEFAULT (cast(unixepoch('subsecond') * 1000 as integer)) NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `user_email_unique` ON `user` (`email`);--> statement-breakpoint
CREATE TABLE `verification` (
	`id` text PRIMARY KEY NOT NULL,
	`identifier` text NOT NULL,
	`value` text NOT NULL,
	`expires_at` integer NOT NULL,
	`created_at` integer DEFAULT (cast(unixepoch('subsecond') * 1000 as integer)) NOT NULL,
	`updated_at` integer DEFAULT (cast(unixepoch('subsecond') * 1000 as integer)) NOT NULL
);
--> statement-breakpoint
CREATE INDEX `verification_identifier` ON `verification` (`identifier`);--> statement-breakpoint
CREATE TABLE `decisions` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`choice` text NOT NULL,
	`reasons` text NOT NULL,
	`note` text,
	`look_again_at` integer,
	`support_after` text,
	`steroids_planned` integer,
	`evidence` text NOT NULL,
	`content_hash` text NOT NULL,
	`statement` text NOT NULL,
	FOREIGN KEY (`supersedes_id`) REFERENCES `decisions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict,
	CONSTRAINT "decisions_look_again" CHECK("decisions"."choice" <> 'not_today' or "decisions"."look_again_at" is not null)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `decisions_supersedes_id_unique` ON `decisions` (`supersedes_id`);--> statement-breakpoint
CREATE INDEX `decisions_episode` ON `decisions` (`episode_id`,`ventilator_day`);--> statement-breakpoint
CREATE INDEX `decisions_unit_day` ON `decisions` (`unit_id`,`ventilator_day`);--> statement-breakpoint
CREATE TABLE `episodes` (
	`id` text PRIMARY KEY NOT NULL,
	`patient_id` text NOT NULL,
	`started_at` integer NOT NULL,
	`start` text NOT NULL,
	`airway` text NOT NULL,
	`ended_at` integer,
	`end` text,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`end_recorded_at` integer,
	`end_recorded_by` text,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`patient_id`) REFERENCES `patients`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`end_recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	CONSTRAINT "episodes_order" CHECK("episodes"."ended_at" is null or "episodes"."ended_at" >= "episodes"."started_at")
);
--> statement-breakpoint
CREATE INDEX `episodes_patient` ON `episodes` (`patient_id`,`started_at`);--> statement-breakpoint
CREATE INDEX `episodes_time` ON `episodes` (`started_at`);--> statement-breakpoint
CREATE UNIQUE INDEX `episodes_open` ON `episodes` (`patient_id`) WHERE ended_at is null;--> statement-breakpoint
CREATE TABLE `hold_ends` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`hold_id` text NOT NULL,
	`outcome` text NOT NULL,
	`rules_met` text NOT NULL,
	`restarts` text NOT NULL,
	`note` text,
	FOREIGN KEY (`supersedes_id`) REFERENCES `hold_ends`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`hold_id`) REFERENCES `holds`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `hold_ends_supersedes_id_unique` ON `hold_ends` (`supersedes_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `hold_ends_first` ON `hold_ends` (`hold_id`) WHERE entry_version = 1;--> statement-breakpoint
CREATE INDEX `hold_ends_hold` ON `hold_ends` (`hold_id`);--> statement-breakpoint
CREATE TABLE `hold_observations` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`hold_id` text NOT NULL,
	`readings` text NOT NULL,
	`opens_eyes_to_voice` text,
	FOREIGN KEY (`supersedes_id`) REFERENCES `hold_observations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`hold_id`) REFERENCES `holds`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `hold_observations_supersedes_id_unique` ON `hold_observations` (`supersedes_id`);--> statement-breakpoint
CREATE INDEX `hold_observations_hold` ON `hold_observations` (`hold_id`,`observed_at`);--> statement-breakpoint
CREATE TABLE `holds` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`start` text NOT NULL,
	`safety` text,
	`infusions` text NOT NULL,
	`note` text,
	FOREIGN KEY (`supersedes_id`) REFERENCES `holds`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `holds_supersedes_id_unique` ON `holds` (`supersedes_id`);--> statement-breakpoint
CREATE INDEX `holds_episode` ON `holds` (`episode_id`,`ventilator_day`);--> statement-breakpoint
CREATE INDEX `holds_unit_day` ON `holds` (`unit_id`,`ventilator_day`);--> statement-breakpoint
CREATE TABLE `job_runs` (
	`id` text PRIMARY KEY NOT NULL,
	`job` text NOT NULL,
	`started_at` integer NOT NULL,
	`ended_at` integer,
	`result` text,
	`detail` text
);
--> statement-breakpoint
CREATE INDEX `job_runs_job` ON `job_runs` (`job`,`started_at`);--> statement-breakpoint
CREATE TABLE `mail_ledger` (
	`id` text PRIMARY KEY NOT NULL,
	`once_key` text NOT NULL,
	`unit_id` text,
	`kind` text NOT NULL,
	`day` text NOT NULL,
	`person_id` text,
	`recipient` text NOT NULL,
	`subject` text NOT NULL,
	`body_text` text NOT NULL,
	`body_html` text NOT NULL,
	`message_id` text NOT NULL,
	`state` text NOT NULL,
	`attempts` integer DEFAULT 0 NOT NULL,
	`last_error` text,
	`queued_at` integer NOT NULL,
	`next_attempt_at` integer NOT NULL,
	`claimed_at` integer,
	`sent_at` integer,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `mail_ledger_once` ON `mail_ledger` (`once_key`);--> statement-breakpoint
CREATE INDEX `mail_ledger_unit` ON `mail_ledger` (`unit_id`,`queued_at`);--> statement-breakpoint
CREATE INDEX `mail_ledger_state` ON `mail_ledger` (`state`,`next_attempt_at`);--> statement-breakpoint
CREATE TABLE `mail_schedules` (
	`unit_id` text PRIMARY KEY NOT NULL,
	`morning_due_min` integer,
	`is_window_end_on` integer DEFAULT true NOT NULL,
	`is_decision_owed_on` integer DEFAULT true NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE TABLE `patients` (
	`id` text PRIMARY KEY NOT NULL,
	`hospital_id` text NOT NULL,
	`record_number` text NOT NULL,
	`family_name` text NOT NULL,
	`given_name` text NOT NULL,
	`birth_date` text,
	`sex` text,
	`height_cm` real,
	`weight_kg` real,
	`created_at` integer NOT NULL,
	`created_by` text NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`hospital_id`) REFERENCES `hospitals`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`created_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `patients_record_number` ON `patients` (`hospital_id`,`record_number`);--> statement-breakpoint
CREATE TABLE `record_openings` (
	`id` text PRIMARY KEY NOT NULL,
	`patient_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`person_id` text NOT NULL,
	`reason` text NOT NULL,
	`opened_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	FOREIGN KEY (`patient_id`) REFERENCES `patients`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE INDEX `record_openings_person` ON `record_openings` (`person_id`,`patient_id`);--> statement-breakpoint
CREATE INDEX `record_openings_unit` ON `record_openings` (`unit_id`,`opened_at`);--> statement-breakpoint
CREATE TABLE `stays` (
	`id` text PRIMARY KEY NOT NULL,
	`patient_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`bed_id` text NOT NULL,
	`started_at` integer NOT NULL,
	`ended_at` integer,
	`end` text,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`patient_id`) REFERENCES `patients`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`bed_id`) REFERENCES `beds`(`id`) ON UPDATE no action ON DELETE restrict,
	CONSTRAINT "stays_order" CHECK("stays"."ended_at" is null or "stays"."ended_at" >= "stays"."started_at")
);
--> statement-breakpoint
CREATE INDEX `stays_unit_time` ON `stays` (`unit_id`,`started_at`);--> statement-breakpoint
CREATE INDEX `stays_patient` ON `stays` (`patient_id`,`started_at`);--> statement-breakpoint
CREATE UNIQUE INDEX `stays_open_patient` ON `stays` (`patient_id`) WHERE ended_at is null;--> statement-breakpoint
CREATE UNIQUE INDEX `stays_open_bed` ON `stays` (`bed_id`) WHERE ended_at is null;--> statement-breakpoint
CREATE INDEX `stays_open_unit` ON `stays` (`unit_id`) WHERE ended_at is null;--> statement-breakpoint
CREATE TABLE `account_links` (
	`id` text PRIMARY KEY NOT NULL,
	`kind` text NOT NULL,
	`person_id` text,
	`token_hash` text NOT NULL,
	`created_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	`used_at` integer,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `account_links_token_hash_unique` ON `account_links` (`token_hash`);--> statement-breakpoint
CREATE TABLE `memberships` (
	`id` text PRIMARY KEY NOT NULL,
	`person_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`role` text NOT NULL,
	`started_at` integer NOT NULL,
	`ended_at` integer,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE INDEX `memberships_person` ON `memberships` (`person_id`);--> statement-breakpoint
CREATE INDEX `memberships_unit` ON `memberships` (`unit_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `memberships_open` ON `memberships` (`person_id`,`unit_id`,`role`) WHERE ended_at is null;--> statement-breakpoint
CREATE TABLE `people` (
	`id` text PRIMARY KEY NOT NULL,
	`hospital_id` text NOT NULL,
	`name` text NOT NULL,
	`is_administrator` integer DEFAULT 0 NOT NULL,
	`created_at` integer NOT NULL,
	`deactivated_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`hospital_id`) REFERENCES `hospitals`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE INDEX `people_hospital` ON `people` (`hospital_id`);--> statement-breakpoint
CREATE TABLE `session_states` (
	`session_id` text PRIMARY KEY NOT NULL,
	`person_id` text NOT NULL,
	`last_active_at` integer NOT NULL,
	`locked_at` integer,
	`failed_unlocks` integer DEFAULT 0 NOT NULL,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE TABLE `protocol_versions` (
	`id` text PRIMARY KEY NOT NULL,
	`unit_id` text NOT NULL,
	`number` integer NOT NULL,
	`content` text NOT NULL,
	`note` text NOT NULL,
	`is_default` integer DEFAULT false NOT NULL,
	`drafted_at` integer NOT NULL,
	`drafted_by` text,
	`approved_at` integer,
	`approved_by` text,
	`starts_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`drafted_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`approved_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `protocol_versions_number` ON `protocol_versions` (`unit_id`,`number`);--> statement-breakpoint
CREATE INDEX `protocol_versions_start` ON `protocol_versions` (`unit_id`,`starts_at`);--> statement-breakpoint
CREATE TABLE `screens` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`result` text NOT NULL,
	`excuse` text,
	`note` text,
	`readings` text,
	`verdict` text,
	FOREIGN KEY (`supersedes_id`) REFERENCES `screens`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict,
	CONSTRAINT "screens_excuse" CHECK(("screens"."result" = 'excused') = ("screens"."excuse" is not null))
);
--> statement-breakpoint
CREATE UNIQUE INDEX `screens_supersedes_id_unique` ON `screens` (`supersedes_id`);--> statement-breakpoint
CREATE INDEX `screens_episode` ON `screens` (`episode_id`,`ventilator_day`);--> statement-breakpoint
CREATE INDEX `screens_unit_day` ON `screens` (`unit_id`,`ventilator_day`);--> statement-breakpoint
CREATE TABLE `gases` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`ph` real NOT NULL,
	`paco2_mmhg` real NOT NULL,
	`pao2_mmhg` real NOT NULL,
	`fio2_fraction` real NOT NULL,
	`bicarbonate_mmol_per_l` real,
	`lactate_mmol_per_l` real,
	`haemoglobin_g_per_dl` real,
	FOREIGN KEY (`supersedes_id`) REFERENCES `gases`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `gases_supersedes_id_unique` ON `gases` (`supersedes_id`);--> statement-breakpoint
CREATE INDEX `gases_episode` ON `gases` (`episode_id`,`observed_at`);--> statement-breakpoint
CREATE TABLE `settings` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`mode` text NOT NULL,
	`fio2_fraction` real NOT NULL,
	`peep_cmh2o` real NOT NULL,
	`set_rate_per_min` real,
	`set_tidal_volume_ml` real,
	`inspiratory_pressure_cmh2o` real,
	`pressure_support_cmh2o` real,
	`measured_rate_per_min` real,
	`measured_tidal_volume_ml` real,
	`peak_pressure_cmh2o` real,
	`plateau_pressure_cmh2o` real,
	`spo2_percent` real,
	FOREIGN KEY (`supersedes_id`) REFERENCES `settings`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `settings_supersedes_id_unique` ON `settings` (`supersedes_id`);--> statement-breakpoint
CREATE INDEX `settings_episode` ON `settings` (`episode_id`,`observed_at`);--> statement-breakpoint
CREATE TABLE `trial_ends` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`trial_id` text NOT NULL,
	`outcome` text NOT NULL,
	`rules_met` text NOT NULL,
	`returned_to` text NOT NULL,
	`reason` text,
	FOREIGN KEY (`supersedes_id`) REFERENCES `trial_ends`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`trial_id`) REFERENCES `trials`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `trial_ends_supersedes_id_unique` ON `trial_ends` (`supersedes_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `trial_ends_first` ON `trial_ends` (`trial_id`) WHERE entry_version = 1;--> statement-breakpoint
CREATE INDEX `trial_ends_trial` ON `trial_ends` (`trial_id`);--> statement-breakpoint
CREATE TABLE `trial_observations` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`trial_id` text NOT NULL,
	`readings` text NOT NULL,
	FOREIGN KEY (`supersedes_id`) REFERENCES `trial_observations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`trial_id`) REFERENCES `trials`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `trial_observations_supersedes_id_unique` ON `trial_observations` (`supersedes_id`);--> statement-breakpoint
CREATE INDEX `trial_observations_trial` ON `trial_observations` (`trial_id`,`observed_at`);--> statement-breakpoint
CREATE TABLE `trials` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`entry_version` integer DEFAULT 1 NOT NULL,
	`supersedes_id` text,
	`amend_reason` text,
	`is_withdrawn` integer DEFAULT 0 NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`ventilator_day` text NOT NULL,
	`observed_at` integer NOT NULL,
	`recorded_at` integer NOT NULL,
	`recorded_by` text NOT NULL,
	`protocol_version_id` text NOT NULL,
	`technique` text NOT NULL,
	`pressure_support_cmh2o` real,
	`peep_cmh2o` real,
	`fio2_fraction` real NOT NULL,
	`planned_duration_min` integer NOT NULL,
	`baseline` text NOT NULL,
	`started_anyway_because` text,
	FOREIGN KEY (`supersedes_id`) REFERENCES `trials`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`recorded_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE restrict,
	FOREIGN KEY (`protocol_version_id`) REFERENCES `protocol_versions`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `trials_supersedes_id_unique` ON `trials` (`supersedes_id`);--> statement-breakpoint
CREATE INDEX `trials_episode` ON `trials` (`episode_id`,`ventilator_day`);--> statement-breakpoint
CREATE INDEX `trials_unit_day` ON `trials` (`unit_id`,`ventilator_day`);--> statement-breakpoint
CREATE TABLE `beds` (
	`id` text PRIMARY KEY NOT NULL,
	`unit_id` text NOT NULL,
	`label` text NOT NULL,
	`sort_order` integer NOT NULL,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE UNIQUE INDEX `beds_label` ON `beds` (`unit_id`,`label`);--> statement-breakpoint
CREATE TABLE `hospitals` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`is_demo` integer DEFAULT 0 NOT NULL,
	`idle_lock_min` integer DEFAULT 15 NOT NULL,
	`created_at` integer NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	CONSTRAINT "hospitals_idle_lock" CHECK("hospitals"."idle_lock_min" between 1 and 240)
);
--> statement-breakpoint
CREATE TABLE `units` (
	`id` text PRIMARY KEY NOT NULL,
	`hospital_id` text NOT NULL,
	`name` text NOT NULL,
	`time_zone` text NOT NULL,
	`altitude_m` real DEFAULT 0 NOT NULL,
	`barometric_pressure_mmhg` real,
	`day_track_from_hour` integer DEFAULT 4 NOT NULL,
	`day_track_to_hour` integer DEFAULT 20 NOT NULL,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`hospital_id`) REFERENCES `hospitals`(`id`) ON UPDATE no action ON DELETE restrict
);
--> statement-breakpoint
CREATE INDEX `units_hospital` ON `units` (`hospital_id`);