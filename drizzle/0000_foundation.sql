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
	`created_at` integer NOT NULL,
	`updated_at` integer NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `account_user` ON `account` (`user_id`);--> statement-breakpoint
CREATE TABLE `api_token` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`user_id` text NOT NULL,
	`name` text NOT NULL,
	`token_hash` text NOT NULL,
	`hint` text NOT NULL,
	`scopes` text NOT NULL,
	`created_at` integer NOT NULL,
	`expires_at` integer,
	`last_used_at` integer,
	`revoked_at` integer,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `api_token_token_hash_unique` ON `api_token` (`token_hash`);--> statement-breakpoint
CREATE INDEX `api_token_organization` ON `api_token` (`organization_id`);--> statement-breakpoint
CREATE TABLE `invitation` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`email` text NOT NULL,
	`role` text,
	`status` text NOT NULL,
	`expires_at` integer NOT NULL,
	`created_at` integer NOT NULL,
	`inviter_id` text NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`inviter_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `invitation_organization` ON `invitation` (`organization_id`);--> statement-breakpoint
CREATE INDEX `invitation_email` ON `invitation` (`email`);--> statement-breakpoint
CREATE TABLE `member` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`user_id` text NOT NULL,
	`role` text NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `member_organization_user` ON `member` (`organization_id`,`user_id`);--> statement-breakpoint
CREATE INDEX `member_user` ON `member` (`user_id`);--> statement-breakpoint
CREATE TABLE `organization` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`slug` text NOT NULL,
	`logo` text,
	`created_at` integer NOT NULL,
	`metadata` text
);
--> statement-breakpoint
CREATE UNIQUE INDEX `organization_slug_unique` ON `organization` (`slug`);--> statement-breakpoint
CREATE TABLE `session` (
	`id` text PRIMARY KEY NOT NULL,
	`expires_at` integer NOT NULL,
	`token` text NOT NULL,
	`created_at` integer NOT NULL,
	`updated_at` integer NOT NULL,
	`ip_address` text,
	`user_agent` text,
	`user_id` text NOT NULL,
	`active_organization_id` text,
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
	`created_at` integer NOT NULL,
	`updated_at` integer NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `user_email_unique` ON `user` (`email`);--> statement-breakpoint
CREATE TABLE `verification` (
	`id` text PRIMARY KEY NOT NULL,
	`identifier` text NOT NULL,
	`value` text NOT NULL,
	`expires_at` integer NOT NULL,
	`created_at` integer NOT NULL,
	`updated_at` integer NOT NULL
);
--> statement-breakpoint
CREATE INDEX `verification_identifier` ON `verification` (`identifier`);--> statement-breakpoint
CREATE TABLE `blob` (
	`hash` text PRIMARY KEY NOT NULL,
	`bytes` blob NOT NULL,
	`size` integer NOT NULL,
	`created_at` integer NOT NULL
);
--> statement-breakpoint
CREATE TABLE `model` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`name` text NOT NULL,
	`kind` text NOT NULL,
	`namespace_uri` text NOT NULL,
	`version` text,
	`publication_date` text,
	`head_seq` integer DEFAULT 0 NOT NULL,
	`node_count` integer DEFAULT 0 NOT NULL,
	`required_models` text NOT NULL,
	`created_at` integer NOT NULL,
	`created_by` text NOT NULL,
	`updated_at` integer NOT NULL,
	`updated_by` text NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `model_namespace` ON `model` (`organization_id`,`namespace_uri`);--> statement-breakpoint
CREATE TABLE `node_id_lease` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`namespace_uri` text NOT NULL,
	`client_id` text NOT NULL,
	`user_id` text NOT NULL,
	`from_id` integer NOT NULL,
	`to_id` integer NOT NULL,
	`at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `node_id_lease_namespace` ON `node_id_lease` (`organization_id`,`namespace_uri`);--> statement-breakpoint
CREATE TABLE `node_id_ledger` (
	`organization_id` text NOT NULL,
	`namespace_uri` text NOT NULL,
	`highest` integer NOT NULL,
	PRIMARY KEY(`organization_id`, `namespace_uri`),
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE TABLE `revision` (
	`id` text PRIMARY KEY NOT NULL,
	`model_id` text NOT NULL,
	`number` integer NOT NULL,
	`seq` integer NOT NULL,
	`pack_hash` text NOT NULL,
	`file_hash` text,
	`file_name` text,
	`message` text NOT NULL,
	`author` text NOT NULL,
	`at` integer NOT NULL,
	`node_count` integer NOT NULL,
	`counts` text,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`pack_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`file_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `revision_number` ON `revision` (`model_id`,`number`);--> statement-breakpoint
CREATE TABLE `sheet` (
	`id` text PRIMARY KEY NOT NULL,
	`model_id` text NOT NULL,
	`name` text NOT NULL,
	`position` integer NOT NULL,
	`layout` text NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	`updated_at` integer NOT NULL,
	`updated_by` text NOT NULL,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `sheet_model` ON `sheet` (`model_id`);--> statement-breakpoint
CREATE TABLE `snapshot` (
	`model_id` text NOT NULL,
	`seq` integer NOT NULL,
	`pack_hash` text NOT NULL,
	PRIMARY KEY(`model_id`, `seq`),
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`pack_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `model_transaction` (
	`model_id` text NOT NULL,
	`seq` integer NOT NULL,
	`base` integer NOT NULL,
	`client_id` text NOT NULL,
	`client_seq` integer NOT NULL,
	`author_id` text NOT NULL,
	`author` text NOT NULL,
	`at` text NOT NULL,
	`label` text NOT NULL,
	`operations` text NOT NULL,
	`inverse` text NOT NULL,
	PRIMARY KEY(`model_id`, `seq`),
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `transaction_client` ON `model_transaction` (`model_id`,`client_id`,`client_seq`);--> statement-breakpoint
CREATE TABLE `uploaded_node_set` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`model_uri` text NOT NULL,
	`version` text,
	`publication_date` text,
	`file_name` text NOT NULL,
	`file_hash` text NOT NULL,
	`pack_hash` text NOT NULL,
	`node_count` integer NOT NULL,
	`required_models` text NOT NULL,
	`uploaded_by` text NOT NULL,
	`at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`file_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`pack_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `uploaded_node_set_file` ON `uploaded_node_set` (`organization_id`,`file_hash`);--> statement-breakpoint
CREATE INDEX `uploaded_node_set_model` ON `uploaded_node_set` (`organization_id`,`model_uri`);--> statement-breakpoint
CREATE TABLE `waiver` (
	`id` text PRIMARY KEY NOT NULL,
	`model_id` text NOT NULL,
	`rule` text NOT NULL,
	`node_key` text NOT NULL,
	`facts` text NOT NULL,
	`reason` text NOT NULL,
	`author` text NOT NULL,
	`at` integer NOT NULL,
	`ends_at` integer,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `waiver_place` ON `waiver` (`model_id`,`rule`,`node_key`);--> statement-breakpoint
CREATE TABLE `audit_entry` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`organization_id` text NOT NULL,
	`at` integer NOT NULL,
	`user_id` text,
	`user_name` text NOT NULL,
	`action` text NOT NULL,
	`subject_kind` text NOT NULL,
	`subject_id` text NOT NULL,
	`subject_name` text NOT NULL,
	`details` text NOT NULL
);
--> statement-breakpoint
CREATE INDEX `audit_entry_organization` ON `audit_entry` (`organization_id`,`id`);--> statement-breakpoint
CREATE TABLE `event_entry` (
	`seq` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`topic` text NOT NULL,
	`reference` integer NOT NULL,
	`at` integer NOT NULL
);
--> statement-breakpoint
CREATE INDEX `event_entry_topic` ON `event_entry` (`topic`,`seq`);--> statement-breakpoint
CREATE TABLE `test_server` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`model_id` text NOT NULL,
	`state` text NOT NULL,
	`endpoint_url` text,
	`options` text NOT NULL,
	`problems` text NOT NULL,
	`owner_pid` integer NOT NULL,
	`owner_host` text NOT NULL,
	`started_by` text NOT NULL,
	`started_at` integer NOT NULL,
	`heartbeat_at` integer NOT NULL,
	`ended_at` integer,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `test_server_model` ON `test_server` (`model_id`);