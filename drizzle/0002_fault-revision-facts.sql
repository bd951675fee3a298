ALTER TABLE `fault_revisions` ADD `board_id` bigint;--> statement-breakpoint
ALTER TABLE `fault_revisions` ADD `part_kind` enum('resistor','ptc','ntc','mov','fuse','diode','zener','gdt','capacitor','inductor','contact','shunt','trimmer','clamp','ic-pin');--> statement-breakpoint
ALTER TABLE `fault_revisions` ADD `incident` enum('unknown','mains-on-ohms','overcurrent-on-amps','overvoltage-on-volts','dropped','battery-leak','wet','none');--> statement-breakpoint
ALTER TABLE `fault_revisions` ADD `symptoms` json NOT NULL;--> statement-breakpoint
ALTER TABLE `fault_steps` ADD `revision` int NOT NULL;--> statement-breakpoint
ALTER TABLE `fault_revisions` ADD CONSTRAINT `fault_revisions_board_id_boards_id_fk` FOREIGN KEY (`board_id`) REFERENCES `boards`(`id`) ON DELETE no action ON UPDATE no action;