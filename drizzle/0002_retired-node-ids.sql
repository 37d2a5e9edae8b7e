CREATE TABLE `retired_node_id` (
	`organization_id` text NOT NULL,
	`node_id` text NOT NULL,
	`node_key` text NOT NULL,
	`node_class` text,
	`browse_name` text,
	PRIMARY KEY(`organization_id`, `node_id`),
	FOREIGN KEY (`organization_id`) REFERENCES `organization`(`id`) ON UPDATE no action ON DELETE cascade
);
