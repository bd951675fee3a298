ALTER TABLE `pins` ADD `version` int DEFAULT 1 NOT NULL;--> statement-breakpoint
CREATE INDEX `photos_sha` ON `photos` (`sha256`);