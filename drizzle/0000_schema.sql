CREATE TABLE `adjustable` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`car_id` text NOT NULL,
	`key` text NOT NULL,
	`label` text NOT NULL,
	`unit` text DEFAULT '' NOT NULL,
	`step` real NOT NULL,
	`low` real NOT NULL,
	`high` real NOT NULL,
	`minutes` real NOT NULL,
	`adjustable_group` text NOT NULL,
	`movable` integer DEFAULT true NOT NULL,
	`belief_mean_pct` real,
	`belief_sd_pct` real,
	`position` integer DEFAULT 0 NOT NULL,
	`archived_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`car_id`) REFERENCES `car`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `adjustable_car_key` ON `adjustable` (`car_id`,`key`);--> statement-breakpoint
CREATE INDEX `adjustable_team` ON `adjustable` (`team_id`);--> statement-breakpoint
CREATE TABLE `car` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`name` text NOT NULL,
	`car_class` text DEFAULT '' NOT NULL,
	`distance_ft` integer DEFAULT 1000 NOT NULL,
	`final_drive_ratio` real,
	`rollout_m` real,
	`rollout_growth_per_mps` real,
	`front_rollout_m` real,
	`pulses_per_turn` integer,
	`band_low_pct` real DEFAULT 13 NOT NULL,
	`band_high_pct` real DEFAULT 17 NOT NULL,
	`slip_window_start_s` real DEFAULT 0.5 NOT NULL,
	`slip_window_end_s` real DEFAULT 2.5 NOT NULL,
	`sensor_note` text DEFAULT '' NOT NULL,
	`archived_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `car_team_name` ON `car` (`team_id`,`name`);--> statement-breakpoint
CREATE TABLE `disc_set` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`car_id` text NOT NULL,
	`name` text NOT NULL,
	`disc_count` integer,
	`notes` text DEFAULT '' NOT NULL,
	`retired_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`car_id`) REFERENCES `car`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `disc_set_car_name` ON `disc_set` (`car_id`,`name`);--> statement-breakpoint
CREATE INDEX `disc_set_team` ON `disc_set` (`team_id`);--> statement-breakpoint
CREATE TABLE `checklist_item` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`car_id` text NOT NULL,
	`label` text NOT NULL,
	`position` integer DEFAULT 0 NOT NULL,
	`required_for_sheet` integer DEFAULT false NOT NULL,
	`archived_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`car_id`) REFERENCES `car`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `checklist_item_car` ON `checklist_item` (`car_id`);--> statement-breakpoint
CREATE TABLE `checklist_signoff` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`item_id` text NOT NULL,
	`round_id` text NOT NULL,
	`service_record_id` text,
	`signed_by` text NOT NULL,
	`override_reason` text,
	`signed_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`item_id`) REFERENCES `checklist_item`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`round_id`) REFERENCES `round`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`service_record_id`) REFERENCES `service_record`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`signed_by`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `checklist_signoff_round` ON `checklist_signoff` (`round_id`);--> statement-breakpoint
CREATE TABLE `decision` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`suggestion_id` text NOT NULL,
	`own_estimate_id` text,
	`choice` text NOT NULL,
	`offer_index` integer,
	`final_settings` text NOT NULL,
	`reason` text DEFAULT '' NOT NULL,
	`decided_by` text NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`suggestion_id`) REFERENCES `suggestion`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`own_estimate_id`) REFERENCES `own_estimate`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`decided_by`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `decision_suggestion` ON `decision` (`suggestion_id`);--> statement-breakpoint
CREATE INDEX `decision_team` ON `decision` (`team_id`);--> statement-breakpoint
CREATE TABLE `launch_sheet` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`car_id` text NOT NULL,
	`round_id` text NOT NULL,
	`decision_id` text NOT NULL,
	`version` integer NOT NULL,
	`settings` text NOT NULL,
	`changes` text NOT NULL,
	`notes` text DEFAULT '' NOT NULL,
	`published_by` text NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`car_id`) REFERENCES `car`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`round_id`) REFERENCES `round`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`decision_id`) REFERENCES `decision`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`published_by`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `launch_sheet_car_version` ON `launch_sheet` (`car_id`,`version`);--> statement-breakpoint
CREATE INDEX `launch_sheet_team` ON `launch_sheet` (`team_id`);--> statement-breakpoint
CREATE TABLE `launch_sheet_seen` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`launch_sheet_id` text NOT NULL,
	`user_id` text NOT NULL,
	`seen_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`launch_sheet_id`) REFERENCES `launch_sheet`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `launch_sheet_seen_once` ON `launch_sheet_seen` (`launch_sheet_id`,`user_id`);--> statement-breakpoint
CREATE TABLE `own_estimate` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`car_id` text NOT NULL,
	`round_id` text NOT NULL,
	`suggestion_id` text,
	`skipped` integer DEFAULT false NOT NULL,
	`slip_pct` real,
	`low_pct` real,
	`high_pct` real,
	`made_by` text NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`car_id`) REFERENCES `car`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`round_id`) REFERENCES `round`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`suggestion_id`) REFERENCES `suggestion`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`made_by`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `own_estimate_round` ON `own_estimate` (`round_id`);--> statement-breakpoint
CREATE TABLE `service_record` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`car_id` text NOT NULL,
	`disc_set_id` text,
	`round_id` text,
	`measurements` text NOT NULL,
	`notes` text DEFAULT '' NOT NULL,
	`corrects_id` text,
	`recorded_by` text NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`car_id`) REFERENCES `car`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`disc_set_id`) REFERENCES `disc_set`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`round_id`) REFERENCES `round`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`recorded_by`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `service_record_car` ON `service_record` (`car_id`,`created_at`);--> statement-breakpoint
CREATE UNIQUE INDEX `service_record_corrects` ON `service_record` (`corrects_id`);--> statement-breakpoint
CREATE TABLE `suggestion` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`car_id` text NOT NULL,
	`round_id` text NOT NULL,
	`reading_id` text NOT NULL,
	`inputs` text NOT NULL,
	`result` text NOT NULL,
	`status` text NOT NULL,
	`model_version` text NOT NULL,
	`training_hash` text NOT NULL,
	`passes_used` integer NOT NULL,
	`created_by` text NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`car_id`) REFERENCES `car`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`round_id`) REFERENCES `round`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`reading_id`) REFERENCES `reading`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`created_by`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `suggestion_team_car` ON `suggestion` (`team_id`,`car_id`,`created_at`);--> statement-breakpoint
CREATE INDEX `suggestion_round` ON `suggestion` (`round_id`);--> statement-breakpoint
CREATE TABLE `event` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`track_id` text NOT NULL,
	`name` text NOT NULL,
	`starts_on` text NOT NULL,
	`ends_on` text NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`track_id`) REFERENCES `track`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `event_team_name_start` ON `event` (`team_id`,`name`,`starts_on`);--> statement-breakpoint
CREATE INDEX `event_track` ON `event` (`track_id`);--> statement-breakpoint
CREATE TABLE `pass` (
	`id` text PRIMARY KEY NOT NULL,
	`root_id` text NOT NULL,
	`corrects_id` text,
	`team_id` text NOT NULL,
	`car_id` text NOT NULL,
	`round_id` text NOT NULL,
	`reading_id` text,
	`pass_no` integer NOT NULL,
	`run_at` text NOT NULL,
	`lane` text,
	`settings` text NOT NULL,
	`runs_on_discs` integer,
	`disc_set_id` text,
	`slip_pct` real,
	`slip_sd_pct` real,
	`slip_source` text,
	`sixty_ft_s` real,
	`three_thirty_ft_s` real,
	`eighth_s` real,
	`eighth_mps` real,
	`thousand_ft_s` real,
	`quarter_s` real,
	`quarter_mps` real,
	`outcome` text,
	`excluded` integer DEFAULT false NOT NULL,
	`excluded_reason` text,
	`correction_reason` text,
	`notes` text DEFAULT '' NOT NULL,
	`source` text NOT NULL,
	`entered_by` text,
	`client_id` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`car_id`) REFERENCES `car`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`round_id`) REFERENCES `round`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`reading_id`) REFERENCES `reading`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`disc_set_id`) REFERENCES `disc_set`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`entered_by`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `pass_corrects` ON `pass` (`corrects_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `pass_team_client` ON `pass` (`team_id`,`client_id`);--> statement-breakpoint
CREATE INDEX `pass_car_time` ON `pass` (`car_id`,`run_at`);--> statement-breakpoint
CREATE INDEX `pass_root` ON `pass` (`root_id`);--> statement-breakpoint
CREATE INDEX `pass_team` ON `pass` (`team_id`);--> statement-breakpoint
CREATE TABLE `reading` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`track_id` text NOT NULL,
	`round_id` text,
	`taken_at` text NOT NULL,
	`air_temp_c` real,
	`relative_humidity` real,
	`dew_point_c` real,
	`wet_bulb_c` real,
	`pressure_pa` real,
	`pressure_kind` text,
	`altitude_m` real,
	`track_temp_c` real,
	`track_temp_place` text DEFAULT '' NOT NULL,
	`wind_mps` real,
	`wind_dir_deg` real,
	`cloud_pct` real,
	`source` text NOT NULL,
	`entered_by` text,
	`corrects_id` text,
	`client_id` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`track_id`) REFERENCES `track`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`round_id`) REFERENCES `round`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`entered_by`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `reading_team_client` ON `reading` (`team_id`,`client_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `reading_corrects` ON `reading` (`corrects_id`);--> statement-breakpoint
CREATE INDEX `reading_team_track_time` ON `reading` (`team_id`,`track_id`,`taken_at`);--> statement-breakpoint
CREATE TABLE `round` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`event_id` text NOT NULL,
	`name` text NOT NULL,
	`position` integer NOT NULL,
	`lane` text,
	`planned_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`event_id`) REFERENCES `event`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `round_event_name` ON `round` (`event_id`,`name`);--> statement-breakpoint
CREATE INDEX `round_team` ON `round` (`team_id`);--> statement-breakpoint
CREATE TABLE `run_log` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`car_id` text NOT NULL,
	`pass_root_id` text,
	`sha256` text NOT NULL,
	`bytes` integer NOT NULL,
	`original_name` text NOT NULL,
	`channel_map` text NOT NULL,
	`trace` text,
	`reduction` text,
	`uploaded_by` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`car_id`) REFERENCES `car`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`uploaded_by`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `run_log_team_hash` ON `run_log` (`team_id`,`sha256`);--> statement-breakpoint
CREATE INDEX `run_log_pass` ON `run_log` (`pass_root_id`);--> statement-breakpoint
CREATE TABLE `track` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`name` text NOT NULL,
	`latitude_deg` real,
	`longitude_deg` real,
	`altitude_m` real,
	`time_zone` text DEFAULT 'UTC' NOT NULL,
	`archived_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `track_team_name` ON `track` (`team_id`,`name`);--> statement-breakpoint
CREATE TABLE `api_token` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`user_id` text NOT NULL,
	`name` text NOT NULL,
	`token_hash` text NOT NULL,
	`scopes` text NOT NULL,
	`last_used_at` text,
	`revoked_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `api_token_token_hash_unique` ON `api_token` (`token_hash`);--> statement-breakpoint
CREATE INDEX `api_token_team` ON `api_token` (`team_id`);--> statement-breakpoint
CREATE TABLE `audit_event` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text,
	`user_id` text,
	`action` text NOT NULL,
	`subject_type` text NOT NULL,
	`subject_id` text,
	`detail` text NOT NULL,
	`request_id` text,
	`at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `audit_event_team_at` ON `audit_event` (`team_id`,`at`);--> statement-breakpoint
CREATE TABLE `membership` (
	`id` text PRIMARY KEY NOT NULL,
	`team_id` text NOT NULL,
	`user_id` text NOT NULL,
	`role` text NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `membership_team_user` ON `membership` (`team_id`,`user_id`);--> statement-breakpoint
CREATE INDEX `membership_user` ON `membership` (`user_id`);--> statement-breakpoint
CREATE TABLE `one_time_token` (
	`id` text PRIMARY KEY NOT NULL,
	`kind` text NOT NULL,
	`token_hash` text NOT NULL,
	`team_id` text,
	`user_id` text,
	`email` text,
	`role` text,
	`expires_at` text NOT NULL,
	`used_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `one_time_token_token_hash_unique` ON `one_time_token` (`token_hash`);--> statement-breakpoint
CREATE TABLE `session` (
	`id` text PRIMARY KEY NOT NULL,
	`user_id` text NOT NULL,
	`expires_at` integer NOT NULL,
	`absolute_expires_at` integer NOT NULL,
	`team_id` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`team_id`) REFERENCES `team`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `session_user` ON `session` (`user_id`);--> statement-breakpoint
CREATE TABLE `team` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`units` text DEFAULT 'us' NOT NULL,
	`demo` integer DEFAULT false NOT NULL,
	`created_at` text NOT NULL
);
--> statement-breakpoint
CREATE TABLE `user` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`email` text NOT NULL,
	`password_hash` text NOT NULL,
	`disabled_at` text,
	`created_at` text NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `user_email_unique` ON `user` (`email`);