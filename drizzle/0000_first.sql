CREATE TABLE `fault_notes` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`board_id` bigint,
	`part_kind` enum('resistor','ptc','ntc','mov','fuse','diode','zener','gdt','capacitor','inductor','contact','shunt','trimmer','clamp','ic-pin'),
	`incident` enum('unknown','mains-on-ohms','overcurrent-on-amps','overvoltage-on-volts','dropped','battery-leak','wet','none'),
	`symptoms` json NOT NULL,
	`title` varchar(160) NOT NULL,
	`state` enum('draft','in-review','published','retired') NOT NULL,
	`revision` int NOT NULL,
	`published_revision` int,
	`words` mediumtext NOT NULL,
	`from_ticket_id` bigint,
	`created_by` bigint NOT NULL,
	`created_at` datetime(3) NOT NULL,
	`updated_at` datetime(3) NOT NULL,
	`published_by` bigint,
	`published_at` datetime(3),
	`version` int NOT NULL DEFAULT 1,
	CONSTRAINT `fault_notes_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `fault_revisions` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`note_id` bigint NOT NULL,
	`revision` int NOT NULL,
	`title` varchar(160) NOT NULL,
	`body` json NOT NULL,
	`author_id` bigint NOT NULL,
	`at` datetime(3) NOT NULL,
	CONSTRAINT `fault_revisions_id` PRIMARY KEY(`id`),
	CONSTRAINT `fault_revisions_number` UNIQUE(`note_id`,`revision`)
);
--> statement-breakpoint
CREATE TABLE `fault_steps` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`note_id` bigint NOT NULL,
	`at` datetime(3) NOT NULL,
	`actor_id` bigint NOT NULL,
	`actor_name` varchar(120) NOT NULL,
	`from_state` enum('draft','in-review','published','retired') NOT NULL,
	`to_state` enum('draft','in-review','published','retired') NOT NULL,
	`note` varchar(1000) NOT NULL DEFAULT '',
	CONSTRAINT `fault_steps_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `revisions` (
	`name` varchar(40) NOT NULL,
	`value` bigint NOT NULL,
	CONSTRAINT `revisions_name` PRIMARY KEY(`name`)
);
--> statement-breakpoint
CREATE TABLE `idempotency` (
	`user_id` bigint NOT NULL,
	`key` varchar(80) NOT NULL,
	`body_hash` char(64) NOT NULL,
	`status` int,
	`answer` mediumtext,
	`etag` varchar(40),
	`created_at` datetime(3) NOT NULL,
	CONSTRAINT `idempotency_user_id_key_pk` PRIMARY KEY(`user_id`,`key`)
);
--> statement-breakpoint
CREATE TABLE `outbox` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`kind` varchar(40) NOT NULL,
	`payload` mediumtext NOT NULL,
	`once_key` varchar(120) NOT NULL,
	`attempts` int NOT NULL DEFAULT 0,
	`due_at` datetime(3) NOT NULL,
	`done_at` datetime(3),
	`dead_at` datetime(3),
	`last_error` varchar(500),
	`created_at` datetime(3) NOT NULL,
	CONSTRAINT `outbox_id` PRIMARY KEY(`id`),
	CONSTRAINT `outbox_once` UNIQUE(`once_key`)
);
--> statement-breakpoint
CREATE TABLE `api_tokens` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`user_id` bigint NOT NULL,
	`name` varchar(80) NOT NULL,
	`hint` varchar(12) NOT NULL,
	`token_hash` char(64) NOT NULL,
	`scopes` json NOT NULL,
	`created_at` datetime(3) NOT NULL,
	`last_used_at` datetime(3),
	`revoked_at` datetime(3),
	CONSTRAINT `api_tokens_id` PRIMARY KEY(`id`),
	CONSTRAINT `api_tokens_hash` UNIQUE(`token_hash`)
);
--> statement-breakpoint
CREATE TABLE `audit` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`at` datetime(3) NOT NULL,
	`actor_id` bigint,
	`actor_name` varchar(120) NOT NULL,
	`action` varchar(60) NOT NULL,
	`object` varchar(120) NOT NULL,
	`detail` json NOT NULL,
	`request_id` varchar(40),
	CONSTRAINT `audit_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `one_time_tokens` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`kind` enum('reset','invite','link') NOT NULL,
	`token_hash` char(64) NOT NULL,
	`user_id` bigint NOT NULL,
	`expires_at` datetime(3) NOT NULL,
	`used_at` datetime(3),
	`created_at` datetime(3) NOT NULL,
	CONSTRAINT `one_time_tokens_id` PRIMARY KEY(`id`),
	CONSTRAINT `one_time_tokens_hash` UNIQUE(`token_hash`)
);
--> statement-breakpoint
CREATE TABLE `rate_limits` (
	`key` varchar(255) NOT NULL,
	`points` int NOT NULL DEFAULT 0,
	`expire` bigint unsigned,
	CONSTRAINT `rate_limits_key` PRIMARY KEY(`key`)
);
--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` char(64) NOT NULL,
	`user_id` bigint NOT NULL,
	`expires_at` datetime(3) NOT NULL,
	`ticket_id` bigint,
	CONSTRAINT `sessions_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `users` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`email` varchar(190) NOT NULL,
	`name` varchar(120) NOT NULL,
	`role` enum('customer','counter','technician','senior','owner') NOT NULL,
	`password_hash` varchar(255),
	`totp_secret` varchar(255),
	`customer_id` bigint,
	`disabled_at` datetime(3),
	`created_at` datetime(3) NOT NULL,
	`version` int NOT NULL DEFAULT 1,
	CONSTRAINT `users_id` PRIMARY KEY(`id`),
	CONSTRAINT `users_email_role` UNIQUE(`email`,`role`),
	CONSTRAINT `users_customer` UNIQUE(`customer_id`)
);
--> statement-breakpoint
CREATE TABLE `photos` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`public_id` char(22) NOT NULL,
	`ticket_id` bigint,
	`board_id` bigint,
	`uploader_id` bigint NOT NULL,
	`state` enum('waiting','ready','refused') NOT NULL,
	`refusal` varchar(300),
	`upload_key` varchar(200),
	`file_name` varchar(200) NOT NULL,
	`declared_type` varchar(60) NOT NULL,
	`declared_bytes` int NOT NULL,
	`side` enum('front','back','other') NOT NULL,
	`phase` enum('before','after') NOT NULL,
	`shared` boolean NOT NULL DEFAULT false,
	`caption` varchar(200) NOT NULL DEFAULT '',
	`width` int,
	`height` int,
	`sha256` char(64),
	`variants` json,
	`created_at` datetime(3) NOT NULL,
	`ready_at` datetime(3),
	`version` int NOT NULL DEFAULT 1,
	CONSTRAINT `photos_id` PRIMARY KEY(`id`),
	CONSTRAINT `photos_public` UNIQUE(`public_id`)
);
--> statement-breakpoint
CREATE TABLE `pins` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`photo_id` bigint NOT NULL,
	`x` double NOT NULL,
	`y` double NOT NULL,
	`part_id` bigint,
	`label` varchar(40) NOT NULL,
	`created_by` bigint NOT NULL,
	`created_at` datetime(3) NOT NULL,
	CONSTRAINT `pins_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `board_nets` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`board_id` bigint NOT NULL,
	`name` varchar(40) NOT NULL,
	`label` varchar(120) NOT NULL DEFAULT '',
	`probe` boolean NOT NULL DEFAULT true,
	`place` int NOT NULL,
	CONSTRAINT `board_nets_id` PRIMARY KEY(`id`),
	CONSTRAINT `board_nets_name` UNIQUE(`board_id`,`name`)
);
--> statement-breakpoint
CREATE TABLE `board_parts` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`board_id` bigint NOT NULL,
	`ref` varchar(20) NOT NULL,
	`kind` enum('resistor','ptc','ntc','mov','fuse','diode','zener','gdt','capacitor','inductor','contact','shunt','trimmer','clamp','ic-pin') NOT NULL,
	`net_a` bigint,
	`net_b` bigint,
	`ohms` double,
	`tolerance` double,
	`closed` json,
	`value` varchar(80) NOT NULL DEFAULT '',
	`protection` boolean NOT NULL DEFAULT false,
	`note` varchar(300) NOT NULL DEFAULT '',
	`place` int NOT NULL,
	CONSTRAINT `board_parts_id` PRIMARY KEY(`id`),
	CONSTRAINT `board_parts_ref` UNIQUE(`board_id`,`ref`)
);
--> statement-breakpoint
CREATE TABLE `boards` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`code` varchar(40) NOT NULL,
	`revision` varchar(20) NOT NULL,
	`maker` varchar(80) NOT NULL,
	`about` text NOT NULL,
	`positions` json NOT NULL,
	`created_at` datetime(3) NOT NULL,
	`version` int NOT NULL DEFAULT 1,
	CONSTRAINT `boards_id` PRIMARY KEY(`id`),
	CONSTRAINT `boards_code` UNIQUE(`code`,`revision`)
);
--> statement-breakpoint
CREATE TABLE `customers` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`name` varchar(120) NOT NULL,
	`email` varchar(190),
	`phone` varchar(40),
	`address` varchar(300),
	`created_at` datetime(3) NOT NULL,
	`version` int NOT NULL DEFAULT 1,
	CONSTRAINT `customers_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `instruments` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`model_id` bigint NOT NULL,
	`serial` varchar(60) NOT NULL,
	`customer_id` bigint NOT NULL,
	`created_at` datetime(3) NOT NULL,
	`version` int NOT NULL DEFAULT 1,
	CONSTRAINT `instruments_id` PRIMARY KEY(`id`),
	CONSTRAINT `instruments_serial` UNIQUE(`model_id`,`serial`)
);
--> statement-breakpoint
CREATE TABLE `models` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`maker` varchar(80) NOT NULL,
	`name` varchar(80) NOT NULL,
	`category` varchar(80) NOT NULL DEFAULT '',
	`board_id` bigint,
	`created_at` datetime(3) NOT NULL,
	`version` int NOT NULL DEFAULT 1,
	CONSTRAINT `models_id` PRIMARY KEY(`id`),
	CONSTRAINT `models_label` UNIQUE(`maker`,`name`)
);
--> statement-breakpoint
CREATE TABLE `messages` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`ticket_id` bigint NOT NULL,
	`side` enum('customer','shop') NOT NULL,
	`author_id` bigint,
	`author_name` varchar(120) NOT NULL,
	`body` text NOT NULL,
	`at` datetime(3) NOT NULL,
	`seen_at` datetime(3),
	CONSTRAINT `messages_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `readings` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`ticket_id` bigint NOT NULL,
	`client_key` char(36) NOT NULL,
	`phase` enum('as-found','after-repair') NOT NULL,
	`place` int NOT NULL,
	`from_net` varchar(40),
	`to_net` varchar(40),
	`part_ref` varchar(20),
	`position` varchar(40),
	`lifted` json NOT NULL,
	`typed` varchar(40) NOT NULL,
	`ohms` double,
	`resolution` double,
	`over_range` boolean NOT NULL DEFAULT false,
	`created_by` bigint NOT NULL,
	`created_at` datetime(3) NOT NULL,
	`version` int NOT NULL DEFAULT 1,
	CONSTRAINT `readings_id` PRIMARY KEY(`id`),
	CONSTRAINT `readings_client` UNIQUE(`ticket_id`,`client_key`)
);
--> statement-breakpoint
CREATE TABLE `ticket_cautions` (
	`ticket_id` bigint NOT NULL,
	`caution` enum('leads','battery','capacitors') NOT NULL,
	`at` datetime(3) NOT NULL,
	`by_id` bigint NOT NULL,
	`by_name` varchar(120) NOT NULL,
	CONSTRAINT `ticket_cautions_ticket_id_caution_pk` PRIMARY KEY(`ticket_id`,`caution`)
);
--> statement-breakpoint
CREATE TABLE `ticket_events` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`ticket_id` bigint NOT NULL,
	`at` datetime(3) NOT NULL,
	`actor_id` bigint,
	`actor_name` varchar(120) NOT NULL,
	`kind` enum('step','caution','photo','message','assigned','claim','fault') NOT NULL,
	`step` varchar(40),
	`from_stage` enum('received','on-the-bench','estimate-sent','approved','in-repair','release-check','ready','handed-over','waiting-for-parts','declined','beyond-repair','returned-unrepaired'),
	`to_stage` enum('received','on-the-bench','estimate-sent','approved','in-repair','release-check','ready','handed-over','waiting-for-parts','declined','beyond-repair','returned-unrepaired'),
	`note` varchar(2000) NOT NULL DEFAULT '',
	`open` boolean NOT NULL,
	CONSTRAINT `ticket_events_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `ticket_notes` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`ticket_id` bigint NOT NULL,
	`author_id` bigint NOT NULL,
	`author_name` varchar(120) NOT NULL,
	`body` text NOT NULL,
	`at` datetime(3) NOT NULL,
	CONSTRAINT `ticket_notes_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `ticket_numbers` (
	`month` char(4) NOT NULL,
	`last` int NOT NULL,
	CONSTRAINT `ticket_numbers_month` PRIMARY KEY(`month`)
);
--> statement-breakpoint
CREATE TABLE `tickets` (
	`id` bigint AUTO_INCREMENT NOT NULL,
	`number` varchar(12) NOT NULL,
	`instrument_id` bigint NOT NULL,
	`customer_id` bigint NOT NULL,
	`board_id` bigint,
	`stage` enum('received','on-the-bench','estimate-sent','approved','in-repair','release-check','ready','handed-over','waiting-for-parts','declined','beyond-repair','returned-unrepaired') NOT NULL,
	`stage_before` enum('received','on-the-bench','estimate-sent','approved','in-repair','release-check','ready','handed-over','waiting-for-parts','declined','beyond-repair','returned-unrepaired'),
	`claim_hash` char(64) NOT NULL,
	`symptoms` json NOT NULL,
	`symptom_text` varchar(2000) NOT NULL DEFAULT '',
	`incident` enum('unknown','mains-on-ohms','overcurrent-on-amps','overvoltage-on-volts','dropped','battery-leak','wet','none') NOT NULL,
	`accessories` json NOT NULL,
	`accessory_text` varchar(300) NOT NULL DEFAULT '',
	`condition` varchar(1000) NOT NULL DEFAULT '',
	`promised_on` date,
	`assigned_to` bigint,
	`estimate_minor` int,
	`estimate_currency` char(3),
	`estimate_for` varchar(1000),
	`exception_reason` varchar(1000),
	`exception_by` bigint,
	`received_at` datetime(3) NOT NULL,
	`stage_at` datetime(3) NOT NULL,
	`closed_at` datetime(3),
	`created_by` bigint NOT NULL,
	`version` int NOT NULL DEFAULT 1,
	CONSTRAINT `tickets_id` PRIMARY KEY(`id`),
	CONSTRAINT `tickets_number` UNIQUE(`number`)
);
--> statement-breakpoint
ALTER TABLE `fault_notes` ADD CONSTRAINT `fault_notes_board_id_boards_id_fk` FOREIGN KEY (`board_id`) REFERENCES `boards`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `fault_notes` ADD CONSTRAINT `fault_notes_from_ticket_id_tickets_id_fk` FOREIGN KEY (`from_ticket_id`) REFERENCES `tickets`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `fault_notes` ADD CONSTRAINT `fault_notes_created_by_users_id_fk` FOREIGN KEY (`created_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `fault_notes` ADD CONSTRAINT `fault_notes_published_by_users_id_fk` FOREIGN KEY (`published_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `fault_revisions` ADD CONSTRAINT `fault_revisions_note_id_fault_notes_id_fk` FOREIGN KEY (`note_id`) REFERENCES `fault_notes`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `fault_revisions` ADD CONSTRAINT `fault_revisions_author_id_users_id_fk` FOREIGN KEY (`author_id`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `fault_steps` ADD CONSTRAINT `fault_steps_note_id_fault_notes_id_fk` FOREIGN KEY (`note_id`) REFERENCES `fault_notes`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `fault_steps` ADD CONSTRAINT `fault_steps_actor_id_users_id_fk` FOREIGN KEY (`actor_id`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `api_tokens` ADD CONSTRAINT `api_tokens_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `audit` ADD CONSTRAINT `audit_actor_id_users_id_fk` FOREIGN KEY (`actor_id`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `one_time_tokens` ADD CONSTRAINT `one_time_tokens_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `sessions` ADD CONSTRAINT `sessions_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `users` ADD CONSTRAINT `users_customer_id_customers_id_fk` FOREIGN KEY (`customer_id`) REFERENCES `customers`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `photos` ADD CONSTRAINT `photos_ticket_id_tickets_id_fk` FOREIGN KEY (`ticket_id`) REFERENCES `tickets`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `photos` ADD CONSTRAINT `photos_board_id_boards_id_fk` FOREIGN KEY (`board_id`) REFERENCES `boards`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `photos` ADD CONSTRAINT `photos_uploader_id_users_id_fk` FOREIGN KEY (`uploader_id`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `pins` ADD CONSTRAINT `pins_photo_id_photos_id_fk` FOREIGN KEY (`photo_id`) REFERENCES `photos`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `pins` ADD CONSTRAINT `pins_part_id_board_parts_id_fk` FOREIGN KEY (`part_id`) REFERENCES `board_parts`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `pins` ADD CONSTRAINT `pins_created_by_users_id_fk` FOREIGN KEY (`created_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `board_nets` ADD CONSTRAINT `board_nets_board_id_boards_id_fk` FOREIGN KEY (`board_id`) REFERENCES `boards`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `board_parts` ADD CONSTRAINT `board_parts_board_id_boards_id_fk` FOREIGN KEY (`board_id`) REFERENCES `boards`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `board_parts` ADD CONSTRAINT `board_parts_net_a_board_nets_id_fk` FOREIGN KEY (`net_a`) REFERENCES `board_nets`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `board_parts` ADD CONSTRAINT `board_parts_net_b_board_nets_id_fk` FOREIGN KEY (`net_b`) REFERENCES `board_nets`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `instruments` ADD CONSTRAINT `instruments_model_id_models_id_fk` FOREIGN KEY (`model_id`) REFERENCES `models`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `instruments` ADD CONSTRAINT `instruments_customer_id_customers_id_fk` FOREIGN KEY (`customer_id`) REFERENCES `customers`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `models` ADD CONSTRAINT `models_board_id_boards_id_fk` FOREIGN KEY (`board_id`) REFERENCES `boards`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `messages` ADD CONSTRAINT `messages_ticket_id_tickets_id_fk` FOREIGN KEY (`ticket_id`) REFERENCES `tickets`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `messages` ADD CONSTRAINT `messages_author_id_users_id_fk` FOREIGN KEY (`author_id`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `readings` ADD CONSTRAINT `readings_ticket_id_tickets_id_fk` FOREIGN KEY (`ticket_id`) REFERENCES `tickets`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `readings` ADD CONSTRAINT `readings_created_by_users_id_fk` FOREIGN KEY (`created_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `ticket_cautions` ADD CONSTRAINT `ticket_cautions_ticket_id_tickets_id_fk` FOREIGN KEY (`ticket_id`) REFERENCES `tickets`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `ticket_cautions` ADD CONSTRAINT `ticket_cautions_by_id_users_id_fk` FOREIGN KEY (`by_id`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `ticket_events` ADD CONSTRAINT `ticket_events_ticket_id_tickets_id_fk` FOREIGN KEY (`ticket_id`) REFERENCES `tickets`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `ticket_events` ADD CONSTRAINT `ticket_events_actor_id_users_id_fk` FOREIGN KEY (`actor_id`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `ticket_notes` ADD CONSTRAINT `ticket_notes_ticket_id_tickets_id_fk` FOREIGN KEY (`ticket_id`) REFERENCES `tickets`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `ticket_notes` ADD CONSTRAINT `ticket_notes_author_id_users_id_fk` FOREIGN KEY (`author_id`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `tickets` ADD CONSTRAINT `tickets_instrument_id_instruments_id_fk` FOREIGN KEY (`instrument_id`) REFERENCES `instruments`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `tickets` ADD CONSTRAINT `tickets_customer_id_customers_id_fk` FOREIGN KEY (`customer_id`) REFERENCES `customers`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `tickets` ADD CONSTRAINT `tickets_board_id_boards_id_fk` FOREIGN KEY (`board_id`) REFERENCES `boards`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `tickets` ADD CONSTRAINT `tickets_assigned_to_users_id_fk` FOREIGN KEY (`assigned_to`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `tickets` ADD CONSTRAINT `tickets_exception_by_users_id_fk` FOREIGN KEY (`exception_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `tickets` ADD CONSTRAINT `tickets_created_by_users_id_fk` FOREIGN KEY (`created_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX `fault_notes_state` ON `fault_notes` (`state`,`updated_at`);--> statement-breakpoint
CREATE INDEX `fault_notes_board` ON `fault_notes` (`board_id`);--> statement-breakpoint
CREATE INDEX `fault_notes_ticket` ON `fault_notes` (`from_ticket_id`);--> statement-breakpoint
CREATE INDEX `fault_steps_note` ON `fault_steps` (`note_id`,`id`);--> statement-breakpoint
CREATE INDEX `idempotency_age` ON `idempotency` (`created_at`);--> statement-breakpoint
CREATE INDEX `outbox_due` ON `outbox` (`done_at`,`dead_at`,`due_at`);--> statement-breakpoint
CREATE INDEX `api_tokens_user` ON `api_tokens` (`user_id`);--> statement-breakpoint
CREATE INDEX `audit_at` ON `audit` (`at`);--> statement-breakpoint
CREATE INDEX `audit_object` ON `audit` (`object`);--> statement-breakpoint
CREATE INDEX `one_time_user` ON `one_time_tokens` (`user_id`);--> statement-breakpoint
CREATE INDEX `sessions_user` ON `sessions` (`user_id`);--> statement-breakpoint
CREATE INDEX `sessions_expiry` ON `sessions` (`expires_at`);--> statement-breakpoint
CREATE INDEX `photos_ticket` ON `photos` (`ticket_id`);--> statement-breakpoint
CREATE INDEX `photos_board` ON `photos` (`board_id`);--> statement-breakpoint
CREATE INDEX `photos_state` ON `photos` (`state`,`created_at`);--> statement-breakpoint
CREATE INDEX `pins_photo` ON `pins` (`photo_id`);--> statement-breakpoint
CREATE INDEX `customers_email` ON `customers` (`email`);--> statement-breakpoint
CREATE INDEX `customers_name` ON `customers` (`name`);--> statement-breakpoint
CREATE INDEX `instruments_customer` ON `instruments` (`customer_id`);--> statement-breakpoint
CREATE INDEX `models_board` ON `models` (`board_id`);--> statement-breakpoint
CREATE INDEX `messages_ticket` ON `messages` (`ticket_id`,`id`);--> statement-breakpoint
CREATE INDEX `readings_sheet` ON `readings` (`ticket_id`,`phase`,`place`);--> statement-breakpoint
CREATE INDEX `ticket_events_ticket` ON `ticket_events` (`ticket_id`,`id`);--> statement-breakpoint
CREATE INDEX `ticket_notes_ticket` ON `ticket_notes` (`ticket_id`,`id`);--> statement-breakpoint
CREATE INDEX `tickets_stage` ON `tickets` (`stage`,`promised_on`);--> statement-breakpoint
CREATE INDEX `tickets_customer` ON `tickets` (`customer_id`);--> statement-breakpoint
CREATE INDEX `tickets_instrument` ON `tickets` (`instrument_id`);--> statement-breakpoint
CREATE INDEX `tickets_board` ON `tickets` (`board_id`);