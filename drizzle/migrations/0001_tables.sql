CREATE TABLE `audit_chains` (
	`chain_id` varchar(40) NOT NULL,
	`last_seq` bigint unsigned NOT NULL,
	`last_hash` varchar(64) NOT NULL,
	CONSTRAINT `audit_chains_chain_id` PRIMARY KEY(`chain_id`)
);
--> statement-breakpoint
CREATE TABLE `audit_entries` (
	`chain_id` varchar(40) NOT NULL,
	`seq` bigint unsigned NOT NULL,
	`at` datetime(3) NOT NULL,
	`actor_kind` enum('user','key','service') NOT NULL,
	`actor_id` varchar(40),
	`action` varchar(64) NOT NULL,
	`subject` varchar(300) NOT NULL,
	`details` mediumtext NOT NULL,
	`previous_hash` varchar(64) NOT NULL,
	`hash` varchar(64) NOT NULL,
	CONSTRAINT `audit_entries_chain_id_seq_pk` PRIMARY KEY(`chain_id`,`seq`)
);
--> statement-breakpoint
CREATE TABLE `breach_events` (
	`id` varchar(40) NOT NULL,
	`breach_id` varchar(40) NOT NULL,
	`kind` varchar(32) NOT NULL,
	`ratio` double NOT NULL,
	`required` double NOT NULL,
	`revision` int unsigned,
	`check_id` varchar(40),
	`actor_user_id` varchar(40),
	`body` text,
	`at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	CONSTRAINT `breach_events_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `breaches` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	`number` int unsigned NOT NULL,
	`subject_hash` varchar(64) NOT NULL,
	`identity` varchar(1024) NOT NULL,
	`origin` enum('head','ci') NOT NULL,
	`repository` varchar(255) NOT NULL DEFAULT '',
	`branch` varchar(255) NOT NULL DEFAULT '',
	`foreground_token_id` varchar(300) NOT NULL,
	`background_token_id` varchar(300) NOT NULL,
	`names` json NOT NULL,
	`kind` enum('text','non-text','focus','link') NOT NULL,
	`theme_id` varchar(40) NOT NULL,
	`fg_state` enum('rest','hover','active','focus','disabled') NOT NULL,
	`bg_state` enum('rest','hover','active','focus','disabled') NOT NULL,
	`basis` enum('srgb','p3') NOT NULL,
	`status` enum('open','waived','resolved') NOT NULL,
	`gating` boolean NOT NULL,
	`ratio` double NOT NULL,
	`required` double NOT NULL,
	`lowest_ratio` double NOT NULL,
	`foreground_hex` varchar(9) NOT NULL,
	`background_hex` varchar(9) NOT NULL,
	`first_seen_at` datetime(3) NOT NULL,
	`first_seen_revision` int unsigned,
	`last_seen_at` datetime(3),
	`resolved_at` datetime(3),
	`closing_reason` enum('fixed','requirement-changed','pair-removed','theme-removed','exempted','engine-changed'),
	`assignee_user_id` varchar(40),
	`waiver_id` varchar(40),
	`version` int unsigned NOT NULL DEFAULT 1,
	CONSTRAINT `breaches_id` PRIMARY KEY(`id`),
	CONSTRAINT `breaches_system_id_subject_hash_uq` UNIQUE(`system_id`,`subject_hash`),
	CONSTRAINT `breaches_system_id_number_uq` UNIQUE(`system_id`,`number`)
);
--> statement-breakpoint
CREATE TABLE `ci_sightings` (
	`system_id` varchar(40) NOT NULL,
	`repository` varchar(255) NOT NULL,
	`branch` varchar(255) NOT NULL,
	`subject_hash` varchar(64) NOT NULL,
	`first_seen_at` datetime(3) NOT NULL,
	`last_seen_at` datetime(3) NOT NULL,
	`count` int unsigned NOT NULL,
	`last_commit` varchar(64),
	CONSTRAINT `ci_sightings_system_id_repository_branch_subject_hash_pk` PRIMARY KEY(`system_id`,`repository`,`branch`,`subject_hash`)
);
--> statement-breakpoint
CREATE TABLE `change_edits` (
	`change_id` varchar(40) NOT NULL,
	`item_kind` enum('token','pair','theme','rules','distinct-set','settings') NOT NULL,
	`item_id` varchar(40) NOT NULL,
	`operation` enum('add','edit','remove') NOT NULL,
	`base_from_revision` int unsigned,
	`proposal` json,
	CONSTRAINT `change_edits_change_id_item_kind_item_id_pk` PRIMARY KEY(`change_id`,`item_kind`,`item_id`)
);
--> statement-breakpoint
CREATE TABLE `change_events` (
	`id` varchar(40) NOT NULL,
	`change_id` varchar(40) NOT NULL,
	`kind` varchar(32) NOT NULL,
	`actor_user_id` varchar(40),
	`body` text,
	`at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	CONSTRAINT `change_events_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `changes` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	`number` int unsigned NOT NULL,
	`title` varchar(200) NOT NULL,
	`description` text,
	`status` enum('draft','in-review','approved','rejected','withdrawn','applied') NOT NULL,
	`author_user_id` varchar(40) NOT NULL,
	`base_revision` int unsigned NOT NULL,
	`applied_revision` int unsigned,
	`created_at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	`version` int unsigned NOT NULL DEFAULT 1,
	CONSTRAINT `changes_id` PRIMARY KEY(`id`),
	CONSTRAINT `changes_system_id_number_uq` UNIQUE(`system_id`,`number`)
);
--> statement-breakpoint
CREATE TABLE `checks` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	`number` int unsigned NOT NULL,
	`against_revision` int unsigned NOT NULL,
	`release_id` varchar(40),
	`caller_user_id` varchar(40),
	`caller_key_id` varchar(40),
	`repository` varchar(255),
	`branch` varchar(255),
	`commit_sha` varchar(64),
	`pipeline_url` varchar(2000),
	`verdict` enum('pass','fail') NOT NULL,
	`counts` json NOT NULL,
	`engine_version` varchar(32) NOT NULL,
	`gamut_map` varchar(64) NOT NULL,
	`rule_set` varchar(64) NOT NULL,
	`findings_gzip` mediumblob NOT NULL,
	`at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	CONSTRAINT `checks_id` PRIMARY KEY(`id`),
	CONSTRAINT `checks_system_id_number_uq` UNIQUE(`system_id`,`number`)
);
--> statement-breakpoint
CREATE TABLE `distinct_set_versions` (
	`system_id` varchar(40) NOT NULL,
	`set_id` varchar(40) NOT NULL,
	`from_revision` int unsigned NOT NULL,
	`to_revision` int unsigned NOT NULL DEFAULT 4294967295,
	`name` varchar(120) NOT NULL,
	`definition` json NOT NULL,
	CONSTRAINT `distinct_set_versions_system_id_set_id_from_revision_pk` PRIMARY KEY(`system_id`,`set_id`,`from_revision`),
	CONSTRAINT `distinct_set_versions_system_id_name_to_revision_uq` UNIQUE(`system_id`,`name`,`to_revision`)
);
--> statement-breakpoint
CREATE TABLE `distinct_sets` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	CONSTRAINT `distinct_sets_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `document_versions` (
	`system_id` varchar(40) NOT NULL,
	`pointer` varchar(512) NOT NULL,
	`from_revision` int unsigned NOT NULL,
	`to_revision` int unsigned NOT NULL DEFAULT 4294967295,
	`content` mediumtext NOT NULL,
	CONSTRAINT `document_versions_system_id_pointer_from_revision_pk` PRIMARY KEY(`system_id`,`pointer`,`from_revision`)
);
--> statement-breakpoint
CREATE TABLE `api_keys` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	`owner_user_id` varchar(40) NOT NULL,
	`name` varchar(120) NOT NULL,
	`kind` enum('read','ci') NOT NULL,
	`hint` varchar(24) NOT NULL,
	`secret_hash` varchar(64) NOT NULL,
	`scopes` json NOT NULL,
	`created_at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	`expires_at` datetime(3) NOT NULL,
	`last_used_at` datetime(3),
	`revoked_at` datetime(3),
	CONSTRAINT `api_keys_id` PRIMARY KEY(`id`),
	CONSTRAINT `api_keys_secret_hash_uq` UNIQUE(`secret_hash`)
);
--> statement-breakpoint
CREATE TABLE `idempotency_records` (
	`key_hash` varchar(64) NOT NULL,
	`request_sha256` varchar(64) NOT NULL,
	`status` smallint unsigned,
	`headers` json,
	`body` mediumtext,
	`expires_at` datetime(3) NOT NULL,
	CONSTRAINT `idempotency_records_key_hash` PRIMARY KEY(`key_hash`)
);
--> statement-breakpoint
CREATE TABLE `rate_counters` (
	`bucket` varchar(191) NOT NULL,
	`hits` int unsigned NOT NULL,
	`window_ends_at` datetime(3) NOT NULL,
	CONSTRAINT `rate_counters_bucket` PRIMARY KEY(`bucket`)
);
--> statement-breakpoint
CREATE TABLE `outbox` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`message_id` varchar(40) NOT NULL,
	`kind` varchar(64) NOT NULL,
	`payload` json NOT NULL,
	`available_at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	`attempts` int unsigned NOT NULL DEFAULT 0,
	`delivered_at` datetime(3),
	`dead_at` datetime(3),
	CONSTRAINT `outbox_id` PRIMARY KEY(`id`),
	CONSTRAINT `outbox_message_id_uq` UNIQUE(`message_id`)
);
--> statement-breakpoint
CREATE TABLE `pair_versions` (
	`system_id` varchar(40) NOT NULL,
	`pair_id` varchar(40) NOT NULL,
	`from_revision` int unsigned NOT NULL,
	`to_revision` int unsigned NOT NULL DEFAULT 4294967295,
	`foreground_token_id` varchar(40) NOT NULL,
	`background_token_id` varchar(40) NOT NULL,
	`use` enum('text','large-text','non-text','focus-adjacent','focus-change','link-in-text') NOT NULL,
	`declaration_hash` varchar(64) NOT NULL,
	`definition` json NOT NULL,
	CONSTRAINT `pair_versions_system_id_pair_id_from_revision_pk` PRIMARY KEY(`system_id`,`pair_id`,`from_revision`),
	CONSTRAINT `pair_versions_system_id_declaration_hash_to_revision_uq` UNIQUE(`system_id`,`declaration_hash`,`to_revision`)
);
--> statement-breakpoint
CREATE TABLE `pairs` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	`position` int unsigned NOT NULL,
	CONSTRAINT `pairs_id` PRIMARY KEY(`id`),
	CONSTRAINT `pairs_system_id_position_uq` UNIQUE(`system_id`,`position`)
);
--> statement-breakpoint
CREATE TABLE `release_artifacts` (
	`release_id` varchar(40) NOT NULL,
	`theme` varchar(63) NOT NULL,
	`format` varchar(32) NOT NULL,
	`sha256` varchar(64) NOT NULL,
	`body` mediumblob NOT NULL,
	`body_gzip` mediumblob NOT NULL,
	`body_brotli` mediumblob NOT NULL,
	CONSTRAINT `release_artifacts_release_id_theme_format_pk` PRIMARY KEY(`release_id`,`theme`,`format`)
);
--> statement-breakpoint
CREATE TABLE `release_withdrawals` (
	`release_id` varchar(40) NOT NULL,
	`reason` varchar(2000) NOT NULL,
	`by_user_id` varchar(40) NOT NULL,
	`at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	CONSTRAINT `release_withdrawals_release_id` PRIMARY KEY(`release_id`)
);
--> statement-breakpoint
CREATE TABLE `releases` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	`version` varchar(128) NOT NULL,
	`major` int unsigned NOT NULL,
	`minor` int unsigned NOT NULL,
	`patch` int unsigned NOT NULL,
	`prerelease` varchar(64) NOT NULL DEFAULT '',
	`revision` int unsigned NOT NULL,
	`manifest` mediumtext NOT NULL,
	`sha256` varchar(64) NOT NULL,
	`signature` text,
	`author_user_id` varchar(40) NOT NULL,
	`at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	CONSTRAINT `releases_id` PRIMARY KEY(`id`),
	CONSTRAINT `releases_system_id_version_uq` UNIQUE(`system_id`,`version`)
);
--> statement-breakpoint
CREATE TABLE `revisions` (
	`system_id` varchar(40) NOT NULL,
	`number` int unsigned NOT NULL,
	`origin` enum('created','direct','import','change','revert') NOT NULL,
	`author_user_id` varchar(40),
	`message` varchar(500),
	`change_id` varchar(40),
	`verdict` enum('pass','fail') NOT NULL,
	`counts` json NOT NULL,
	`engine_version` varchar(32) NOT NULL,
	`gamut_map` varchar(64) NOT NULL,
	`rule_set` varchar(64) NOT NULL,
	`digest` varchar(64) NOT NULL,
	`at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	CONSTRAINT `revisions_system_id_number_pk` PRIMARY KEY(`system_id`,`number`)
);
--> statement-breakpoint
CREATE TABLE `rule_versions` (
	`system_id` varchar(40) NOT NULL,
	`scope` enum('system','prefix') NOT NULL,
	`prefix` varchar(255) NOT NULL DEFAULT '',
	`from_revision` int unsigned NOT NULL,
	`to_revision` int unsigned NOT NULL DEFAULT 4294967295,
	`position` int unsigned NOT NULL DEFAULT 0,
	`definition` json NOT NULL,
	CONSTRAINT `rule_versions_system_id_scope_prefix_from_revision_pk` PRIMARY KEY(`system_id`,`scope`,`prefix`,`from_revision`)
);
--> statement-breakpoint
CREATE TABLE `memberships` (
	`system_id` varchar(40) NOT NULL,
	`user_id` varchar(40) NOT NULL,
	`role` enum('engineer','maintainer','accessibility-lead') NOT NULL,
	`version` int unsigned NOT NULL DEFAULT 1,
	CONSTRAINT `memberships_system_id_user_id_pk` PRIMARY KEY(`system_id`,`user_id`)
);
--> statement-breakpoint
CREATE TABLE `setting_versions` (
	`system_id` varchar(40) NOT NULL,
	`from_revision` int unsigned NOT NULL,
	`to_revision` int unsigned NOT NULL DEFAULT 4294967295,
	`definition` json NOT NULL,
	CONSTRAINT `setting_versions_system_id_from_revision_pk` PRIMARY KEY(`system_id`,`from_revision`),
	CONSTRAINT `setting_versions_system_id_to_revision_uq` UNIQUE(`system_id`,`to_revision`)
);
--> statement-breakpoint
CREATE TABLE `system_counters` (
	`system_id` varchar(40) NOT NULL,
	`counter` varchar(32) NOT NULL,
	`last_value` bigint unsigned NOT NULL,
	CONSTRAINT `system_counters_system_id_counter_pk` PRIMARY KEY(`system_id`,`counter`)
);
--> statement-breakpoint
CREATE TABLE `system_heads` (
	`system_id` varchar(40) NOT NULL,
	`revision` int unsigned NOT NULL DEFAULT 0,
	`verdict_epoch` bigint unsigned NOT NULL DEFAULT 0,
	`next_change_number` int unsigned NOT NULL DEFAULT 1,
	`next_breach_number` int unsigned NOT NULL DEFAULT 1,
	CONSTRAINT `system_heads_system_id` PRIMARY KEY(`system_id`)
);
--> statement-breakpoint
CREATE TABLE `systems` (
	`id` varchar(40) NOT NULL,
	`key` varchar(63) NOT NULL,
	`name` varchar(120) NOT NULL,
	`visibility` enum('members','instance') NOT NULL DEFAULT 'members',
	`write_mode` enum('direct','review') NOT NULL DEFAULT 'direct',
	`created_at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	`version` int unsigned NOT NULL DEFAULT 1,
	CONSTRAINT `systems_id` PRIMARY KEY(`id`),
	CONSTRAINT `systems_key_uq` UNIQUE(`key`)
);
--> statement-breakpoint
CREATE TABLE `theme_versions` (
	`system_id` varchar(40) NOT NULL,
	`theme_id` varchar(40) NOT NULL,
	`from_revision` int unsigned NOT NULL,
	`to_revision` int unsigned NOT NULL DEFAULT 4294967295,
	`key` varchar(63) NOT NULL,
	`position` int unsigned NOT NULL,
	`gating` boolean NOT NULL,
	`definition` json NOT NULL,
	CONSTRAINT `theme_versions_system_id_theme_id_from_revision_pk` PRIMARY KEY(`system_id`,`theme_id`,`from_revision`),
	CONSTRAINT `theme_versions_system_id_key_to_revision_uq` UNIQUE(`system_id`,`key`,`to_revision`)
);
--> statement-breakpoint
CREATE TABLE `themes` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	CONSTRAINT `themes_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `token_versions` (
	`system_id` varchar(40) NOT NULL,
	`token_id` varchar(40) NOT NULL,
	`from_revision` int unsigned NOT NULL,
	`to_revision` int unsigned NOT NULL DEFAULT 4294967295,
	`name` varchar(255) NOT NULL,
	`definition` json NOT NULL,
	CONSTRAINT `token_versions_system_id_token_id_from_revision_pk` PRIMARY KEY(`system_id`,`token_id`,`from_revision`),
	CONSTRAINT `token_versions_system_id_name_to_revision_uq` UNIQUE(`system_id`,`name`,`to_revision`)
);
--> statement-breakpoint
CREATE TABLE `tokens` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	`position` int unsigned NOT NULL,
	CONSTRAINT `tokens_id` PRIMARY KEY(`id`),
	CONSTRAINT `tokens_system_id_position_uq` UNIQUE(`system_id`,`position`)
);
--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` varchar(40) NOT NULL,
	`user_id` varchar(40) NOT NULL,
	`token_hash` varchar(64) NOT NULL,
	`created_at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	`last_seen_at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	`expires_at` datetime(3) NOT NULL,
	`ended_at` datetime(3),
	CONSTRAINT `sessions_id` PRIMARY KEY(`id`),
	CONSTRAINT `sessions_token_hash_uq` UNIQUE(`token_hash`)
);
--> statement-breakpoint
CREATE TABLE `users` (
	`id` varchar(40) NOT NULL,
	`email` varchar(254) NOT NULL,
	`name` varchar(120) NOT NULL,
	`password_hash` varchar(255) NOT NULL,
	`is_admin` boolean NOT NULL DEFAULT false,
	`created_at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	`deactivated_at` datetime(3),
	`version` int unsigned NOT NULL DEFAULT 1,
	CONSTRAINT `users_id` PRIMARY KEY(`id`),
	CONSTRAINT `users_email_uq` UNIQUE(`email`)
);
--> statement-breakpoint
CREATE TABLE `waivers` (
	`id` varchar(40) NOT NULL,
	`system_id` varchar(40) NOT NULL,
	`fg_token_id` varchar(40) NOT NULL,
	`bg_token_id` varchar(40) NOT NULL,
	`kind` enum('text','non-text','focus','link') NOT NULL,
	`theme_id` varchar(40),
	`fg_state` enum('rest','hover','active','focus','disabled'),
	`bg_state` enum('rest','hover','active','focus','disabled'),
	`status` enum('requested','granted','declined','revoked','ended') NOT NULL,
	`requested_by` varchar(40) NOT NULL,
	`decided_by` varchar(40),
	`reason` varchar(2000) NOT NULL,
	`floor_ratio` double NOT NULL,
	`required` double NOT NULL,
	`requested_at` datetime(3) NOT NULL DEFAULT current_timestamp(3),
	`ends_at` datetime(3) NOT NULL,
	`version` int unsigned NOT NULL DEFAULT 1,
	CONSTRAINT `waivers_id` PRIMARY KEY(`id`),
	CONSTRAINT `waivers_decided_by_ck` CHECK(`waivers`.`decided_by` <> `waivers`.`requested_by`)
);
--> statement-breakpoint
ALTER TABLE `audit_entries` ADD CONSTRAINT `audit_entries_chain_id_audit_chains_chain_id_fk` FOREIGN KEY (`chain_id`) REFERENCES `audit_chains`(`chain_id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `breach_events` ADD CONSTRAINT `breach_events_breach_id_breaches_id_fk` FOREIGN KEY (`breach_id`) REFERENCES `breaches`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `breach_events` ADD CONSTRAINT `breach_events_check_id_checks_id_fk` FOREIGN KEY (`check_id`) REFERENCES `checks`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `breach_events` ADD CONSTRAINT `breach_events_actor_user_id_users_id_fk` FOREIGN KEY (`actor_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `breaches` ADD CONSTRAINT `breaches_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `breaches` ADD CONSTRAINT `breaches_assignee_user_id_users_id_fk` FOREIGN KEY (`assignee_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `breaches` ADD CONSTRAINT `breaches_waiver_id_waivers_id_fk` FOREIGN KEY (`waiver_id`) REFERENCES `waivers`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `ci_sightings` ADD CONSTRAINT `ci_sightings_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `change_edits` ADD CONSTRAINT `change_edits_change_id_changes_id_fk` FOREIGN KEY (`change_id`) REFERENCES `changes`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `change_events` ADD CONSTRAINT `change_events_change_id_changes_id_fk` FOREIGN KEY (`change_id`) REFERENCES `changes`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `change_events` ADD CONSTRAINT `change_events_actor_user_id_users_id_fk` FOREIGN KEY (`actor_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `changes` ADD CONSTRAINT `changes_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `changes` ADD CONSTRAINT `changes_author_user_id_users_id_fk` FOREIGN KEY (`author_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `checks` ADD CONSTRAINT `checks_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `checks` ADD CONSTRAINT `checks_release_id_releases_id_fk` FOREIGN KEY (`release_id`) REFERENCES `releases`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `checks` ADD CONSTRAINT `checks_caller_user_id_users_id_fk` FOREIGN KEY (`caller_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `checks` ADD CONSTRAINT `checks_caller_key_id_api_keys_id_fk` FOREIGN KEY (`caller_key_id`) REFERENCES `api_keys`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `distinct_set_versions` ADD CONSTRAINT `distinct_set_versions_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `distinct_set_versions` ADD CONSTRAINT `distinct_set_versions_set_id_distinct_sets_id_fk` FOREIGN KEY (`set_id`) REFERENCES `distinct_sets`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `distinct_sets` ADD CONSTRAINT `distinct_sets_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `document_versions` ADD CONSTRAINT `document_versions_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `api_keys` ADD CONSTRAINT `api_keys_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `api_keys` ADD CONSTRAINT `api_keys_owner_user_id_users_id_fk` FOREIGN KEY (`owner_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `pair_versions` ADD CONSTRAINT `pair_versions_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `pair_versions` ADD CONSTRAINT `pair_versions_pair_id_pairs_id_fk` FOREIGN KEY (`pair_id`) REFERENCES `pairs`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `pair_versions` ADD CONSTRAINT `pair_versions_foreground_token_id_tokens_id_fk` FOREIGN KEY (`foreground_token_id`) REFERENCES `tokens`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `pair_versions` ADD CONSTRAINT `pair_versions_background_token_id_tokens_id_fk` FOREIGN KEY (`background_token_id`) REFERENCES `tokens`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `pairs` ADD CONSTRAINT `pairs_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `release_artifacts` ADD CONSTRAINT `release_artifacts_release_id_releases_id_fk` FOREIGN KEY (`release_id`) REFERENCES `releases`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `release_withdrawals` ADD CONSTRAINT `release_withdrawals_release_id_releases_id_fk` FOREIGN KEY (`release_id`) REFERENCES `releases`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `release_withdrawals` ADD CONSTRAINT `release_withdrawals_by_user_id_users_id_fk` FOREIGN KEY (`by_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `releases` ADD CONSTRAINT `releases_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `releases` ADD CONSTRAINT `releases_author_user_id_users_id_fk` FOREIGN KEY (`author_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `revisions` ADD CONSTRAINT `revisions_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `revisions` ADD CONSTRAINT `revisions_author_user_id_users_id_fk` FOREIGN KEY (`author_user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `revisions` ADD CONSTRAINT `revisions_change_id_changes_id_fk` FOREIGN KEY (`change_id`) REFERENCES `changes`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `rule_versions` ADD CONSTRAINT `rule_versions_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `memberships` ADD CONSTRAINT `memberships_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `memberships` ADD CONSTRAINT `memberships_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `setting_versions` ADD CONSTRAINT `setting_versions_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `system_counters` ADD CONSTRAINT `system_counters_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `system_heads` ADD CONSTRAINT `system_heads_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `theme_versions` ADD CONSTRAINT `theme_versions_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `theme_versions` ADD CONSTRAINT `theme_versions_theme_id_themes_id_fk` FOREIGN KEY (`theme_id`) REFERENCES `themes`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `themes` ADD CONSTRAINT `themes_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `token_versions` ADD CONSTRAINT `token_versions_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `token_versions` ADD CONSTRAINT `token_versions_token_id_tokens_id_fk` FOREIGN KEY (`token_id`) REFERENCES `tokens`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `tokens` ADD CONSTRAINT `tokens_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `sessions` ADD CONSTRAINT `sessions_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `waivers` ADD CONSTRAINT `waivers_system_id_systems_id_fk` FOREIGN KEY (`system_id`) REFERENCES `systems`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `waivers` ADD CONSTRAINT `waivers_fg_token_id_tokens_id_fk` FOREIGN KEY (`fg_token_id`) REFERENCES `tokens`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `waivers` ADD CONSTRAINT `waivers_bg_token_id_tokens_id_fk` FOREIGN KEY (`bg_token_id`) REFERENCES `tokens`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `waivers` ADD CONSTRAINT `waivers_theme_id_themes_id_fk` FOREIGN KEY (`theme_id`) REFERENCES `themes`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `waivers` ADD CONSTRAINT `waivers_requested_by_users_id_fk` FOREIGN KEY (`requested_by`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
ALTER TABLE `waivers` ADD CONSTRAINT `waivers_decided_by_users_id_fk` FOREIGN KEY (`decided_by`) REFERENCES `users`(`id`) ON DELETE restrict ON UPDATE restrict;--> statement-breakpoint
CREATE INDEX `audit_entries_chain_id_at_idx` ON `audit_entries` (`chain_id`,`at`);--> statement-breakpoint
CREATE INDEX `breach_events_breach_id_idx` ON `breach_events` (`breach_id`,`at`,`id`);--> statement-breakpoint
CREATE INDEX `breaches_system_id_status_idx` ON `breaches` (`system_id`,`status`,`first_seen_at`,`id`);--> statement-breakpoint
CREATE INDEX `breaches_system_id_assignee_user_id_idx` ON `breaches` (`system_id`,`assignee_user_id`,`status`);--> statement-breakpoint
CREATE INDEX `change_events_change_id_idx` ON `change_events` (`change_id`,`at`,`id`);--> statement-breakpoint
CREATE INDEX `changes_system_id_status_idx` ON `changes` (`system_id`,`status`);--> statement-breakpoint
CREATE INDEX `checks_system_id_verdict_idx` ON `checks` (`system_id`,`verdict`,`number`);--> statement-breakpoint
CREATE INDEX `checks_caller_key_id_idx` ON `checks` (`caller_key_id`,`number`);--> statement-breakpoint
CREATE INDEX `distinct_set_versions_system_id_to_revision_idx` ON `distinct_set_versions` (`system_id`,`to_revision`,`from_revision`);--> statement-breakpoint
CREATE INDEX `document_versions_system_id_to_revision_idx` ON `document_versions` (`system_id`,`to_revision`,`from_revision`);--> statement-breakpoint
CREATE INDEX `api_keys_system_id_idx` ON `api_keys` (`system_id`,`owner_user_id`);--> statement-breakpoint
CREATE INDEX `idempotency_records_expires_at_idx` ON `idempotency_records` (`expires_at`);--> statement-breakpoint
CREATE INDEX `rate_counters_window_ends_at_idx` ON `rate_counters` (`window_ends_at`);--> statement-breakpoint
CREATE INDEX `outbox_delivered_at_idx` ON `outbox` (`delivered_at`,`dead_at`,`available_at`);--> statement-breakpoint
CREATE INDEX `pair_versions_system_id_to_revision_idx` ON `pair_versions` (`system_id`,`to_revision`,`from_revision`);--> statement-breakpoint
CREATE INDEX `pair_versions_system_id_from_revision_idx` ON `pair_versions` (`system_id`,`from_revision`);--> statement-breakpoint
CREATE INDEX `releases_system_id_major_idx` ON `releases` (`system_id`,`major`,`minor`,`patch`);--> statement-breakpoint
CREATE INDEX `rule_versions_system_id_to_revision_idx` ON `rule_versions` (`system_id`,`to_revision`,`from_revision`);--> statement-breakpoint
CREATE INDEX `rule_versions_system_id_from_revision_idx` ON `rule_versions` (`system_id`,`from_revision`);--> statement-breakpoint
CREATE INDEX `theme_versions_system_id_to_revision_idx` ON `theme_versions` (`system_id`,`to_revision`,`from_revision`);--> statement-breakpoint
CREATE INDEX `theme_versions_system_id_from_revision_idx` ON `theme_versions` (`system_id`,`from_revision`);--> statement-breakpoint
CREATE INDEX `token_versions_system_id_to_revision_idx` ON `token_versions` (`system_id`,`to_revision`,`from_revision`);--> statement-breakpoint
CREATE INDEX `token_versions_system_id_from_revision_idx` ON `token_versions` (`system_id`,`from_revision`);--> statement-breakpoint
CREATE INDEX `sessions_user_id_idx` ON `sessions` (`user_id`);--> statement-breakpoint
CREATE INDEX `sessions_expires_at_idx` ON `sessions` (`expires_at`);--> statement-breakpoint
CREATE INDEX `waivers_system_id_status_idx` ON `waivers` (`system_id`,`status`,`ends_at`);