ALTER TABLE `breaches` MODIFY COLUMN `identity` text NOT NULL;--> statement-breakpoint
ALTER TABLE `breaches` MODIFY COLUMN `foreground_token_id` varchar(1024) NOT NULL;--> statement-breakpoint
ALTER TABLE `breaches` MODIFY COLUMN `background_token_id` varchar(1024) NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` MODIFY COLUMN `identity` text NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` MODIFY COLUMN `foreground_token_id` varchar(1024) NOT NULL;--> statement-breakpoint
ALTER TABLE `ci_sightings` MODIFY COLUMN `background_token_id` varchar(1024) NOT NULL;