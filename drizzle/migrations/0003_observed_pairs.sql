CREATE TABLE `observed_pairs` (
	`system_id` varchar(40) NOT NULL,
	`declaration_hash` varchar(64) NOT NULL,
	`pair` json NOT NULL,
	`first_seen_at` datetime(3) NOT NULL,
	`last_seen_at` datetime(3) NOT NULL,
	`count` int unsigned NOT NULL,
	`repository` varchar(255),
	`branch` varchar(255),
	CONSTRAINT `observed_pairs_system_id_declaration_hash_pk` PRIMARY KEY(`system_id`,`declaration_hash`)
);
--> statement-breakpoint
ALTER TABLE `breaches` ADD `met_by` json;--> statement-breakpoint
ALTER TABLE `systems` ADD `protected_branches` json DEFAULT ('[]') NOT NULL;--> statement-breakpoint
ALTER TABLE `observed_pairs` ADD CONSTRAINT `observed_pairs_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
CREATE INDEX `observed_pairs_system_id_last_seen_at_idx` ON `observed_pairs` (`system_id`,`last_seen_at`);