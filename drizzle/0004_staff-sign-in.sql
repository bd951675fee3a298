ALTER TABLE `users` ADD `totp_last_step` bigint;--> statement-breakpoint
ALTER TABLE `users` ADD `staff_email` varchar(190) GENERATED ALWAYS AS ((if(`role` = 'customer', null, `email`))) STORED;--> statement-breakpoint
ALTER TABLE `users` ADD CONSTRAINT `users_staff_email` UNIQUE(`staff_email`);