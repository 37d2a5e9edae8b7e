CREATE TABLE `mail` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`kind` text NOT NULL,
	`to_address` text NOT NULL,
	`to_name` text NOT NULL,
	`subject` text NOT NULL,
	`text` text NOT NULL,
	`html` text NOT NULL,
	`unsubscribe_url` text NOT NULL,
	`state` text NOT NULL,
	`attempts` integer NOT NULL,
	`next_attempt_at` integer NOT NULL,
	`last_error` text,
	`created_at` integer NOT NULL,
	`sent_at` integer,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `mail_due` ON `mail` (`state`,`next_attempt_at`);--> statement-breakpoint
CREATE INDEX `mail_organization` ON `mail` (`organization_id`,`created_at`);--> statement-breakpoint
CREATE TABLE `webhook` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`url` text NOT NULL,
	`sealed_secret` text NOT NULL,
	`created_by` text NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `webhook_organization` ON `webhook` (`organization_id`);--> statement-breakpoint
CREATE TABLE `webhook_delivery` (
	`id` text PRIMARY KEY NOT NULL,
	`webhook_id` text NOT NULL,
	`event` text NOT NULL,
	`body` text NOT NULL,
	`state` text NOT NULL,
	`attempts` integer NOT NULL,
	`next_attempt_at` integer NOT NULL,
	`last_status` integer,
	`last_error` text,
	`created_at` integer NOT NULL,
	`delivered_at` integer,
	FOREIGN KEY (`webhook_id`) REFERENCES `webhook`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `webhook_delivery_due` ON `webhook_delivery` (`state`,`next_attempt_at`);--> statement-breakpoint
CREATE INDEX `webhook_delivery_webhook` ON `webhook_delivery` (`webhook_id`);--> statement-breakpoint
CREATE TABLE `delivery` (
	`id` text PRIMARY KEY NOT NULL,
	`release_id` text NOT NULL,
	`gateway_id` text NOT NULL,
	`gateway_name` text NOT NULL,
	`bundle_hash` text NOT NULL,
	`state` text NOT NULL,
	`sent_by` text NOT NULL,
	`sent_at` integer NOT NULL,
	`loaded_by` text,
	`loaded_at` integer,
	`proved_by` text,
	`proved_at` integer,
	`note` text NOT NULL,
	FOREIGN KEY (`release_id`) REFERENCES `release`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `delivery_release` ON `delivery` (`release_id`);--> statement-breakpoint
CREATE INDEX `delivery_gateway` ON `delivery` (`gateway_id`);--> statement-breakpoint
CREATE TABLE `mail_refusal` (
	`user_id` text NOT NULL,
	`kind` text NOT NULL,
	`at` integer NOT NULL,
	PRIMARY KEY(`user_id`, `kind`),
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE TABLE `reader` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`name` text NOT NULL,
	`about` text NOT NULL,
	`contact` text NOT NULL,
	`node_ids` text NOT NULL,
	`updated_by` text NOT NULL,
	`updated_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `reader_name` ON `reader` (`organization_id`,`name`);--> statement-breakpoint
CREATE TABLE `release` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`model_id` text NOT NULL,
	`review_id` text,
	`revision` integer NOT NULL,
	`version` text NOT NULL,
	`model_version` text NOT NULL,
	`publication_date` text NOT NULL,
	`rating` text,
	`previous_id` text,
	`pack_hash` text NOT NULL,
	`bundle_hash` text NOT NULL,
	`bundle_size` integer NOT NULL,
	`file_name` text NOT NULL,
	`files` text NOT NULL,
	`required` text NOT NULL,
	`key_id` text NOT NULL,
	`notes` text NOT NULL,
	`released_by` text NOT NULL,
	`at` integer NOT NULL,
	`withdrawn_at` integer,
	`withdrawn_by` text,
	`withdrawn_reason` text,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`pack_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`bundle_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `release_version` ON `release` (`model_id`,`version`);--> statement-breakpoint
CREATE INDEX `release_organization` ON `release` (`organization_id`);--> statement-breakpoint
CREATE TABLE `release_policy` (
	`organization_id` text PRIMARY KEY NOT NULL,
	`approvals` integer NOT NULL,
	`updated_by` text NOT NULL,
	`updated_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE TABLE `review` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`model_id` text NOT NULL,
	`number` integer NOT NULL,
	`title` text NOT NULL,
	`revision` integer NOT NULL,
	`base_revision` integer NOT NULL,
	`state` text NOT NULL,
	`author_id` text NOT NULL,
	`author` text NOT NULL,
	`asked_at` integer NOT NULL,
	`closed_at` integer,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `review_number` ON `review` (`organization_id`,`number`);--> statement-breakpoint
CREATE INDEX `review_model` ON `review` (`model_id`);--> statement-breakpoint
CREATE TABLE `review_comment` (
	`id` text PRIMARY KEY NOT NULL,
	`review_id` text NOT NULL,
	`model_id` text NOT NULL,
	`node_key` text,
	`change` text,
	`parent_id` text,
	`author_id` text NOT NULL,
	`author` text NOT NULL,
	`at` integer NOT NULL,
	`text` text NOT NULL,
	`suggestion` text,
	`applied_at` integer,
	`applied_by` text,
	`resolved_at` integer,
	`resolved_by` text,
	FOREIGN KEY (`review_id`) REFERENCES `review`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `review_comment_review` ON `review_comment` (`review_id`);--> statement-breakpoint
CREATE INDEX `review_comment_node` ON `review_comment` (`model_id`,`node_key`);--> statement-breakpoint
CREATE TABLE `reviewer` (
	`review_id` text NOT NULL,
	`user_id` text NOT NULL,
	`name` text NOT NULL,
	`decision` text,
	`decided_at` integer,
	`decided_revision` integer,
	`voided_at` integer,
	`voided_by` text,
	PRIMARY KEY(`review_id`, `user_id`),
	FOREIGN KEY (`review_id`) REFERENCES `review`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE TABLE `signing_key` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`public_key` text NOT NULL,
	`sealed_private_key` text NOT NULL,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `signing_key_organization` ON `signing_key` (`organization_id`);--> statement-breakpoint
DROP INDEX `model_namespace`;--> statement-breakpoint
ALTER TABLE `model` ADD `variant_of` text;--> statement-breakpoint
ALTER TABLE `model` ADD `variant_base_hash` text REFERENCES blob(hash);--> statement-breakpoint
CREATE INDEX `model_variant` ON `model` (`variant_of`);--> statement-breakpoint
CREATE UNIQUE INDEX `model_namespace` ON `model` (`organization_id`,`namespace_uri`) WHERE "model"."variant_of" is null;--> statement-breakpoint
ALTER TABLE `revision` ADD `changes` text;