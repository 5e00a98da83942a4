CREATE TABLE `calendar_links` (
	`id` text PRIMARY KEY NOT NULL,
	`site_id` text NOT NULL,
	`secret_hash` text NOT NULL,
	`label` text,
	`alarms` integer NOT NULL,
	`created_at_ms` integer NOT NULL,
	`last_read_at_ms` integer,
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "calendar_links_id" CHECK(length("calendar_links"."id") between 1 and 64 and instr("calendar_links"."id", char(0)) = 0 and "calendar_links"."id" glob '[A-Za-z0-9]*' and "calendar_links"."id" not glob '*[^A-Za-z0-9-]*'),
	CONSTRAINT "calendar_links_secret" CHECK(length("calendar_links"."secret_hash") between 16 and 128),
	CONSTRAINT "calendar_links_label" CHECK(length("calendar_links"."label") between 1 and 80 and instr("calendar_links"."label", char(0)) = 0 and trim("calendar_links"."label", char(9, 10, 32)) <> '' and "calendar_links"."label" not glob '*[' || char(1, 45, 8, 11, 45, 31, 127) || ']*'),
	CONSTRAINT "calendar_links_alarms" CHECK("calendar_links"."alarms" in (0, 1)),
	CONSTRAINT "calendar_links_created_at" CHECK(typeof("calendar_links"."created_at_ms") in ('integer', 'null') and "calendar_links"."created_at_ms" between -2208988800000 and 7258204800000),
	CONSTRAINT "calendar_links_last_read_at" CHECK(typeof("calendar_links"."last_read_at_ms") in ('integer', 'null') and "calendar_links"."last_read_at_ms" between -2208988800000 and 7258204800000)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `calendar_links_secret` ON `calendar_links` (`secret_hash`);--> statement-breakpoint
CREATE INDEX `calendar_links_by_site` ON `calendar_links` (`site_id`,`created_at_ms`);--> statement-breakpoint
CREATE TABLE `due_evenings` (
	`uid` text PRIMARY KEY NOT NULL,
	`site_id` text NOT NULL,
	`evening` text NOT NULL,
	`sequence` integer NOT NULL,
	`created_at_ms` integer NOT NULL,
	`modified_at_ms` integer NOT NULL,
	`state` text NOT NULL,
	`fingerprint` text NOT NULL,
	`prop_ids` text NOT NULL,
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE cascade,
	CONSTRAINT "due_evenings_uid" CHECK(length("due_evenings"."uid") between 1 and 255 and instr("due_evenings"."uid", char(0)) = 0 and trim("due_evenings"."uid", char(9, 10, 32)) <> '' and "due_evenings"."uid" not glob '*[' || char(1, 45, 8, 11, 45, 31, 127) || ']*'),
	CONSTRAINT "due_evenings_evening" CHECK("due_evenings"."evening" glob '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]' and date("due_evenings"."evening") is "due_evenings"."evening"),
	CONSTRAINT "due_evenings_sequence" CHECK(typeof("due_evenings"."sequence") in ('integer', 'null') and "due_evenings"."sequence" between 0 and 2147483647),
	CONSTRAINT "due_evenings_created_at" CHECK(typeof("due_evenings"."created_at_ms") in ('integer', 'null') and "due_evenings"."created_at_ms" between -2208988800000 and 7258204800000),
	CONSTRAINT "due_evenings_modified_at" CHECK(typeof("due_evenings"."modified_at_ms") in ('integer', 'null') and "due_evenings"."modified_at_ms" between -2208988800000 and 7258204800000),
	CONSTRAINT "due_evenings_state" CHECK("due_evenings"."state" in ('due', 'cancelled')),
	CONSTRAINT "due_evenings_prop_ids" CHECK(json_valid("due_evenings"."prop_ids") and json_type("due_evenings"."prop_ids") = 'array')
);
--> statement-breakpoint
CREATE INDEX `due_evenings_by_site` ON `due_evenings` (`site_id`,`evening`);--> statement-breakpoint
CREATE TABLE `replays` (
	`key` text PRIMARY KEY NOT NULL,
	`body_hash` text NOT NULL,
	`status` integer NOT NULL,
	`body` text NOT NULL,
	`at_ms` integer NOT NULL,
	CONSTRAINT "replays_key" CHECK(length("replays"."key") between 1 and 600 and instr("replays"."key", char(0)) = 0 and trim("replays"."key", char(9, 10, 32)) <> '' and "replays"."key" not glob '*[' || char(1, 45, 8, 11, 45, 31, 127) || ']*'),
	CONSTRAINT "replays_status" CHECK(typeof("replays"."status") in ('integer', 'null') and "replays"."status" between 100 and 599),
	CONSTRAINT "replays_at" CHECK(typeof("replays"."at_ms") in ('integer', 'null') and "replays"."at_ms" between -2208988800000 and 7258204800000)
);
--> statement-breakpoint
CREATE INDEX `replays_by_age` ON `replays` (`at_ms`);