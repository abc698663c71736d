CREATE TABLE `jobs` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	`kind` enum('import','repair-plan','check') NOT NULL,
	`caller_user_id` varchar(40),
	`caller_key_id` varchar(40),
	`request_id` varchar(64) NOT NULL,
	`state` enum('running','done','failed') NOT NULL DEFAULT 'running',
	`progress` json NOT NULL,
	`result` mediumtext,
	`failure` json,
	`lease_ends_at` datetime(3) NOT NULL,
	`created_at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	`finished_at` datetime(3),
	CONSTRAINT `jobs_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
ALTER TABLE `jobs` ADD CONSTRAINT `jobs_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `jobs` ADD CONSTRAINT `jobs_caller_user_id_users_id_fk` FOREIGN KEY (`caller_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `jobs` ADD CONSTRAINT `jobs_caller_key_id_api_keys_id_fk` FOREIGN KEY (`caller_key_id`) REFERENCES `api_keys`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
CREATE INDEX `jobs_system_id_created_at_idx` ON `jobs` (`system_id`,`created_at`);--> statement-breakpoint
CREATE INDEX `jobs_created_at_idx` ON `jobs` (`created_at`);