ALTER TABLE `breach_events` ADD `assignee_user_id` varchar(40);--> statement-breakpoint
ALTER TABLE `breaches` ADD `use` enum('text','large-text','non-text','focus-adjacent','focus-change','link-in-text') NOT NULL;--> statement-breakpoint
-- Rows of before: what the kind and the requirement tell of the use.
UPDATE `breaches` SET `use` = CASE WHEN `kind` = 'non-text' THEN 'non-text' WHEN `kind` = 'focus' THEN 'focus-adjacent' WHEN `kind` = 'link' THEN 'link-in-text' WHEN `required` < 4.5 THEN 'large-text' ELSE 'text' END;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `identity` varchar(1024) NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `is_protected` boolean NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `foreground_token_id` varchar(300) NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `background_token_id` varchar(300) NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `names` json NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `kind` enum('text','non-text','focus','link') NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `use` enum('text','large-text','non-text','focus-adjacent','focus-change','link-in-text') NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `theme_id` varchar(40) NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `fg_state` enum('rest','hover','active','focus','disabled') NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `bg_state` enum('rest','hover','active','focus','disabled') NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `basis` enum('srgb','p3') NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `gating` boolean NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `ratio` double NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `required` double NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `foreground_hex` varchar(9) NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `background_hex` varchar(9) NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD `last_check_id` varchar(40) NOT NULL;--> statement-breakpoint
ALTER TABLE `checks` ADD `logged` json;--> statement-breakpoint
ALTER TABLE `memberships` ADD `created_at` datetime(3) DEFAULT current_timestamp(3) NOT NULL;--> statement-breakpoint
ALTER TABLE `breach_events` ADD CONSTRAINT `breach_events_assignee_user_id_users_id_fk` FOREIGN KEY (`assignee_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD CONSTRAINT `ci_sightings_last_check_id_checks_id_fk` FOREIGN KEY (`last_check_id`) REFERENCES `checks`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
CREATE INDEX `ci_sightings_system_id_first_seen_at_idx` ON `ci_sightings` (`system_id`,`first_seen_at`);--> statement-breakpoint
CREATE INDEX `ci_sightings_is_protected_last_seen_at_idx` ON `ci_sightings` (`is_protected`,`last_seen_at`);