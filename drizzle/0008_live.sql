CREATE TABLE `as_built_report` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`model_id` text NOT NULL,
	`number` integer NOT NULL,
	`revision_number` integer NOT NULL,
	`release_id` text,
	`delivery_id` text,
	`target_id` text NOT NULL,
	`target_name` text NOT NULL,
	`endpoint_url` text NOT NULL,
	`verdict` text NOT NULL,
	`counted` integer NOT NULL,
	`ignored` integer NOT NULL,
	`body_hash` text NOT NULL,
	`signature` text,
	`made_by` text NOT NULL,
	`at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`body_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `as_built_report_number` ON `as_built_report` (`model_id`,`number`);--> statement-breakpoint
CREATE INDEX `as_built_report_organization` ON `as_built_report` (`organization_id`,`at`);--> statement-breakpoint
CREATE TABLE `as_built_schedule` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`model_id` text NOT NULL,
	`endpoint_id` text NOT NULL,
	`every_minutes` integer NOT NULL,
	`next_at` integer NOT NULL,
	`last_verdict` text,
	`last_at` integer,
	`made_by` text NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`endpoint_id`) REFERENCES `endpoint`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `as_built_schedule_pair` ON `as_built_schedule` (`model_id`,`endpoint_id`);--> statement-breakpoint
CREATE INDEX `as_built_schedule_next` ON `as_built_schedule` (`next_at`);--> statement-breakpoint
CREATE TABLE `endpoint` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`name` text NOT NULL,
	`url` text NOT NULL,
	`security_mode` text NOT NULL,
	`security_policy` text NOT NULL,
	`token_kind` text NOT NULL,
	`user_name` text,
	`secret` text,
	`user_certificate` text,
	`server_certificate` text,
	`gateway_id` text,
	`note` text NOT NULL,
	`updated_by` text NOT NULL,
	`updated_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `endpoint_name` ON `endpoint` (`organization_id`,`name`);--> statement-breakpoint
CREATE TABLE `endpoint_allowance` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`host` text NOT NULL,
	`port_from` integer NOT NULL,
	`port_to` integer NOT NULL,
	`note` text NOT NULL,
	`added_by` text NOT NULL,
	`added_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `endpoint_allowance_place` ON `endpoint_allowance` (`organization_id`,`host`,`port_from`,`port_to`);--> statement-breakpoint
CREATE TABLE `point_check` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`model_id` text NOT NULL,
	`machine_key` text NOT NULL,
	`node_id` text NOT NULL,
	`path` text NOT NULL,
	`stimulus` text NOT NULL,
	`local_reading` real NOT NULL,
	`shown_value` real NOT NULL,
	`unit` text NOT NULL,
	`tolerance` real NOT NULL,
	`is_within` integer NOT NULL,
	`note` text NOT NULL,
	`checked_by` text NOT NULL,
	`at` integer NOT NULL,
	`due_since` integer,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `point_check_machine` ON `point_check` (`model_id`,`machine_key`,`at`);--> statement-breakpoint
CREATE TABLE `watch_board` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`model_id` text NOT NULL,
	`name` text NOT NULL,
	`type_node_id` text NOT NULL,
	`content` text NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	`updated_by` text NOT NULL,
	`updated_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `watch_board_model` ON `watch_board` (`model_id`);