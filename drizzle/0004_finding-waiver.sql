CREATE TABLE `finding_waiver` (
	`id` text PRIMARY KEY NOT NULL,
	`model_id` text NOT NULL,
	`rule` text NOT NULL,
	`node_id` text NOT NULL,
	`attribute` text NOT NULL,
	`reason` text NOT NULL,
	`person` text NOT NULL,
	`at` integer NOT NULL,
	`fingerprint` text NOT NULL,
	FOREIGN KEY (`model_id`) REFERENCES `model`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `finding_waiver_place` ON `finding_waiver` (`model_id`,`rule`,`node_id`,`attribute`);