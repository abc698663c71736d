-- Beside the missing grants: these refuse everybody, whatever their rights.
CREATE TRIGGER `audit_entries_no_update` BEFORE UPDATE ON `audit_entries` FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'audit_entries is append-only';
--> statement-breakpoint
CREATE TRIGGER `audit_entries_no_delete` BEFORE DELETE ON `audit_entries` FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'audit_entries is append-only';
--> statement-breakpoint
CREATE TRIGGER `release_artifacts_no_update` BEFORE UPDATE ON `release_artifacts` FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'release_artifacts is append-only';
--> statement-breakpoint
CREATE TRIGGER `release_artifacts_no_delete` BEFORE DELETE ON `release_artifacts` FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'release_artifacts is append-only';
--> statement-breakpoint
CREATE TRIGGER `release_withdrawals_no_update` BEFORE UPDATE ON `release_withdrawals` FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'release_withdrawals is append-only';
--> statement-breakpoint
CREATE TRIGGER `release_withdrawals_no_delete` BEFORE DELETE ON `release_withdrawals` FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'release_withdrawals is append-only';
--> statement-breakpoint
CREATE TRIGGER `releases_no_update` BEFORE UPDATE ON `releases` FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'releases is append-only';
--> statement-breakpoint
CREATE TRIGGER `releases_no_delete` BEFORE DELETE ON `releases` FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'releases is append-only';
--> statement-breakpoint
CREATE TRIGGER `revisions_no_update` BEFORE UPDATE ON `revisions` FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'revisions is append-only';
--> statement-breakpoint
CREATE TRIGGER `revisions_no_delete` BEFORE DELETE ON `revisions` FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'revisions is append-only';
