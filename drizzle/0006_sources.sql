CREATE TABLE `column_template` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`name` text NOT NULL,
	`columns` text NOT NULL,
	`updated_by` text NOT NULL,
	`updated_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `column_template_name` ON `column_template` (`organization_id`,`name`);--> statement-breakpoint
CREATE TABLE `device_description` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`vendor_id` integer NOT NULL,
	`device_id` integer NOT NULL,
	`vendor_name` text NOT NULL,
	`device_name` text NOT NULL,
	`product_ids` text NOT NULL,
	`schema_version` text NOT NULL,
	`document_version` text NOT NULL,
	`release_date` text NOT NULL,
	`languages` text NOT NULL,
	`file_name` text NOT NULL,
	`entry_name` text NOT NULL,
	`file_hash` text NOT NULL,
	`description_hash` text NOT NULL,
	`pictures` text NOT NULL,
	`problems` text NOT NULL,
	`uploaded_by` text NOT NULL,
	`at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`file_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`description_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `device_description_file` ON `device_description` (`organization_id`,`file_hash`,`entry_name`);--> statement-breakpoint
CREATE INDEX `device_description_device` ON `device_description` (`organization_id`,`vendor_id`,`device_id`);--> statement-breakpoint
CREATE TABLE `device_replacement` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`model_id` text NOT NULL,
	`machine_key` text NOT NULL,
	`machine_name` text NOT NULL,
	`role` text NOT NULL,
	`kind` text NOT NULL,
	`before` text NOT NULL,
	`after` text NOT NULL,
	`reason` text NOT NULL,
	`targets` text NOT NULL,
	`person` text NOT NULL,
	`at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `device_replacement_machine` ON `device_replacement` (`organization_id`,`model_id`,`machine_key`);--> statement-breakpoint
CREATE TABLE `export_template` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`name` text NOT NULL,
	`gateway_type` text NOT NULL,
	`file_name` text NOT NULL,
	`template` text NOT NULL,
	`cases` text NOT NULL,
	`updated_by` text NOT NULL,
	`updated_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `export_template_name` ON `export_template` (`organization_id`,`name`);--> statement-breakpoint
CREATE TABLE `gateway` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`name` text NOT NULL,
	`endpoint_url` text,
	`note` text NOT NULL,
	`updated_by` text NOT NULL,
	`updated_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `gateway_name` ON `gateway` (`organization_id`,`name`);--> statement-breakpoint
CREATE TABLE `gateway_machine` (
	`model_id` text NOT NULL,
	`machine_key` text NOT NULL,
	`gateway_id` text NOT NULL,
	PRIMARY KEY(`model_id`, `machine_key`),
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`gateway_id`) REFERENCES `gateway`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `gateway_machine_gateway` ON `gateway_machine` (`gateway_id`);--> statement-breakpoint
CREATE TABLE `source` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`name` text NOT NULL,
	`kind` text NOT NULL,
	`address` text NOT NULL,
	`note` text NOT NULL,
	`updated_by` text NOT NULL,
	`updated_at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `source_name` ON `source` (`organization_id`,`name`);--> statement-breakpoint
CREATE TABLE `source_port` (
	`source_id` text NOT NULL,
	`port` integer NOT NULL,
	`plan` text NOT NULL,
	`updated_by` text NOT NULL,
	`updated_at` integer NOT NULL,
	PRIMARY KEY(`source_id`, `port`),
	FOREIGN KEY (`source_id`) REFERENCES `source`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE TABLE `tag_list` (
	`id` text PRIMARY KEY NOT NULL,
	`organization_id` text NOT NULL,
	`name` text NOT NULL,
	`source_id` text,
	`file_name` text NOT NULL,
	`file_hash` text,
	`tags_hash` text NOT NULL,
	`count` integer NOT NULL,
	`columns` text NOT NULL,
	`uploaded_by` text NOT NULL,
	`at` integer NOT NULL,
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`source_id`) REFERENCES `source`(`id`) ON UPDATE no action ON DELETE set null,
	FOREIGN KEY (`file_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`tags_hash`) REFERENCES `blob`(`hash`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `tag_list_name` ON `tag_list` (`organization_id`,`name`);