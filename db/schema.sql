-- Generated from db/migrations by `npm run schema`; not edited by hand.

CREATE TABLE `access_tokens` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `user_id` char(36) NOT NULL,
  `name` varchar(160) NOT NULL,
  `digest` binary(32) NOT NULL COMMENT 'SHA-256 of the token',
  `created_at` datetime(3) NOT NULL,
  `expires_at` datetime(3) NOT NULL,
  `revoked_at` datetime(3) DEFAULT NULL,
  `last_used_at` datetime(3) DEFAULT NULL,
  `access` enum('read','change') NOT NULL DEFAULT 'change' COMMENT 'read: GET alone',
  `families` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin DEFAULT NULL COMMENT 'families of routes that it opens; null: all' CHECK (json_valid(`families`)),
  PRIMARY KEY (`id`),
  UNIQUE KEY `access_tokens_digest` (`digest`),
  KEY `access_tokens_user` (`user_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `account_tokens` (
  `digest` binary(32) NOT NULL COMMENT 'SHA-256 of the token in a link that was mailed',
  `purpose` enum('invitation','password-reset') NOT NULL,
  `subject` char(36) NOT NULL COMMENT 'id of the invitation, or of the person',
  `created_at` datetime(3) NOT NULL,
  `expires_at` datetime(3) NOT NULL,
  PRIMARY KEY (`digest`),
  KEY `account_tokens_subject` (`purpose`,`subject`),
  KEY `account_tokens_expiry` (`expires_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_bin;

CREATE TABLE `activities` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `kind` varchar(60) NOT NULL COMMENT 'in own words: ship at berth',
  `place` varchar(80) NOT NULL DEFAULT '',
  `starts_at` int(10) unsigned NOT NULL,
  `ends_at` int(10) unsigned NOT NULL,
  `note` varchar(500) NOT NULL DEFAULT '',
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `withdrawn_by` char(36) DEFAULT NULL,
  `withdrawn_at` datetime(3) DEFAULT NULL,
  `withdrawal_reason` varchar(500) DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `activities_time` (`network_id`,`starts_at`),
  KEY `activities_kind` (`network_id`,`kind`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `alert_items` (
  `id` bigint(20) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `recipient` varchar(254) NOT NULL,
  `exceedance_id` int(10) unsigned NOT NULL,
  `item_key` varchar(120) NOT NULL COMMENT 'a revision of an exceedance, told once a recipient',
  `words` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'what is told, as it stood then' CHECK (json_valid(`words`)),
  `due_at` datetime(3) NOT NULL COMMENT 'when a message takes it up',
  `told_at` datetime(3) DEFAULT NULL COMMENT 'null: no message has taken it up yet',
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `alert_items_once` (`recipient`,`item_key`),
  KEY `alert_items_due` (`told_at`,`due_at`),
  KEY `alert_items_recipient` (`network_id`,`recipient`,`told_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `alert_preferences` (
  `network_id` int(10) unsigned NOT NULL,
  `user_id` char(36) NOT NULL,
  `delivery` enum('at-once','hourly','daily') NOT NULL,
  `daily_at_min` smallint(5) unsigned NOT NULL COMMENT 'minutes after midnight, civil time of the network',
  `group_min` smallint(5) unsigned NOT NULL COMMENT 'least minutes between two messages',
  `quiet_from_min` smallint(5) unsigned DEFAULT NULL COMMENT 'minutes after midnight, civil time; null: no quiet hours',
  `quiet_to_min` smallint(5) unsigned DEFAULT NULL,
  `override_tenths` smallint(5) unsigned DEFAULT NULL COMMENT 'tenths of a dB above the limit from which it is told at once; null: never',
  `station_ids` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin DEFAULT NULL COMMENT 'null: every station' CHECK (json_valid(`station_ids`)),
  `warns_early` tinyint(1) NOT NULL DEFAULT 0,
  `changed_at` datetime(3) NOT NULL,
  PRIMARY KEY (`network_id`,`user_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `alert_tellings` (
  `kind` enum('escalation','early-warning') NOT NULL,
  `subject` varchar(100) NOT NULL COMMENT 'names what was told, once for good',
  `told_at` datetime(3) NOT NULL,
  PRIMARY KEY (`kind`,`subject`),
  KEY `alert_tellings_age` (`told_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_bin;

CREATE TABLE `answering_settings` (
  `network_id` int(10) unsigned NOT NULL,
  `needs_approval` tinyint(1) NOT NULL DEFAULT 0 COMMENT 'a second person approves an answer before it goes',
  `reply_address` varchar(254) DEFAULT NULL COMMENT 'where residents answer to; {reference} in it is filled in; null: the sender',
  `updated_by` char(36) NOT NULL,
  `updated_at` datetime(3) NOT NULL,
  PRIMARY KEY (`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `audit_head` (
  `only_row` tinyint(3) unsigned NOT NULL,
  `last_id` bigint(20) unsigned NOT NULL,
  `last_digest` binary(32) NOT NULL,
  PRIMARY KEY (`only_row`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `audit_log` (
  `id` bigint(20) unsigned NOT NULL COMMENT 'gapless: the place in the chain',
  `at` datetime(3) NOT NULL,
  `user_id` char(36) DEFAULT NULL,
  `from_address` varchar(45) DEFAULT NULL COMMENT 'where a signed-in person acted from; null: Bittern itself, a monitor, a resident',
  `network_id` int(10) unsigned DEFAULT NULL,
  `action` varchar(60) NOT NULL,
  `subject` varchar(160) NOT NULL,
  `detail` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'before and after; for personal tables field names only' CHECK (json_valid(`detail`)),
  `previous_digest` binary(32) NOT NULL,
  `digest` binary(32) NOT NULL COMMENT 'SHA-256 over the previous digest and this row',
  PRIMARY KEY (`id`),
  KEY `audit_log_network` (`network_id`,`at`),
  KEY `audit_log_user` (`user_id`,`id`),
  KEY `audit_log_action` (`action`,`id`),
  KEY `audit_log_subject` (`subject`,`id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `band_sets` (
  `id` smallint(5) unsigned NOT NULL AUTO_INCREMENT,
  `fraction` tinyint(3) unsigned NOT NULL,
  `band_indices` varchar(160) NOT NULL COMMENT 'ascending, comma separated',
  PRIMARY KEY (`id`),
  UNIQUE KEY `band_sets_bands` (`fraction`,`band_indices`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `calendar_feeds` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `user_id` char(36) NOT NULL COMMENT 'the feed shows what this person may still see',
  `digest` binary(32) NOT NULL COMMENT 'SHA-256 of the token in the address',
  `created_at` datetime(3) NOT NULL,
  `revoked_at` datetime(3) DEFAULT NULL,
  `last_used_at` datetime(3) DEFAULT NULL,
  `purpose` enum('calendar','exceedances') NOT NULL DEFAULT 'calendar' COMMENT 'what the address reads, and nothing else',
  PRIMARY KEY (`id`),
  UNIQUE KEY `calendar_feeds_digest` (`digest`),
  KEY `calendar_feeds_person` (`user_id`,`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `calibration_certificates` (
  `calibration_id` int(10) unsigned NOT NULL,
  `media_type` varchar(40) NOT NULL COMMENT 'as the bytes say, not as the sender said',
  `byte_count` int(10) unsigned NOT NULL,
  `sha256` binary(32) NOT NULL COMMENT 'names the file under the data directory',
  `uploaded_by` char(36) NOT NULL,
  `uploaded_at` datetime(3) NOT NULL,
  PRIMARY KEY (`calibration_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `calibration_settings` (
  `network_id` int(10) unsigned NOT NULL,
  `drift_bound_centi_db` smallint(5) unsigned NOT NULL,
  `check_every_days` smallint(5) unsigned NOT NULL,
  `remind_before_days` smallint(5) unsigned NOT NULL,
  `recipients` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'e-mail addresses; empty: the operators of the network' CHECK (json_valid(`recipients`)),
  `changed_by` char(36) NOT NULL,
  `changed_at` datetime(3) NOT NULL,
  PRIMARY KEY (`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `calibrations` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `instrument_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned DEFAULT NULL COMMENT 'where it stood then; null: in no station',
  `checked_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC',
  `calibrator` varchar(160) NOT NULL DEFAULT '' COMMENT 'kind and serial number in own words',
  `calibrator_centi_db` smallint(6) NOT NULL COMMENT 'level of the calibrator at 1 kHz',
  `before_centi_db` smallint(6) NOT NULL COMMENT 'shown before any adjustment',
  `after_centi_db` smallint(6) DEFAULT NULL COMMENT 'shown after adjustment; null: not adjusted',
  `drift_bound_centi_db` smallint(5) unsigned NOT NULL COMMENT 'of the network when the check was noted',
  `checked_by` varchar(160) NOT NULL,
  `note` varchar(500) NOT NULL DEFAULT '',
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `withdrawn_by` char(36) DEFAULT NULL,
  `withdrawn_at` datetime(3) DEFAULT NULL,
  `withdrawal_reason` varchar(500) DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `calibrations_instrument` (`instrument_id`,`checked_at`),
  KEY `calibrations_network` (`network_id`,`checked_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `clock_offsets` (
  `station_id` int(10) unsigned NOT NULL,
  `quarter_starts_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC by our clock',
  `ahead_sec` double NOT NULL COMMENT 'greatest sentAt less our time of the quarter-hour: the post with the shortest way',
  PRIMARY KEY (`station_id`,`quarter_starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `clock_shift_starts` (
  `station_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL COMMENT 'of the stored interval, as shifted',
  `shift_id` int(10) unsigned NOT NULL,
  `is_late` tinyint(3) unsigned NOT NULL COMMENT '1: came after the shift was made',
  PRIMARY KEY (`station_id`,`starts_at`),
  KEY `clock_shift_starts_shift` (`shift_id`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `clock_shifts` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL,
  `from_sec` int(10) unsigned NOT NULL COMMENT 'first start of the episode by the clock of the monitor, epoch seconds',
  `to_sec` int(10) unsigned NOT NULL COMMENT 'exclusive',
  `shift_sec` int(11) NOT NULL COMMENT 'added to starts of the episode',
  `received_from_sec` int(10) unsigned NOT NULL DEFAULT 0 COMMENT 'what came before is not of the episode',
  `reason` varchar(500) NOT NULL,
  `state` enum('moving','moved','reversing','reversed') NOT NULL,
  `planned_count` int(10) unsigned NOT NULL,
  `moved_count` int(10) unsigned NOT NULL DEFAULT 0,
  `aside_count` int(10) unsigned NOT NULL DEFAULT 0 COMMENT 'put into quarantine by the reversal',
  `problem` varchar(300) DEFAULT NULL COMMENT 'why it was put back by itself',
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `reversed_by` char(36) DEFAULT NULL,
  `reversal_reason` varchar(500) DEFAULT NULL,
  `finished_at` datetime(3) DEFAULT NULL COMMENT 'of the move, then of the reversal',
  PRIMARY KEY (`id`),
  KEY `clock_shifts_station` (`station_id`,`state`),
  KEY `clock_shifts_state` (`state`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_additions` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `complaint_id` int(10) unsigned NOT NULL,
  `ciphertext` blob NOT NULL COMMENT 'AES-256-GCM of what the resident wrote later',
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`id`),
  KEY `complaint_additions_complaint` (`complaint_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_answers` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `complaint_id` int(10) unsigned NOT NULL,
  `state` enum('draft','submitted','sent','withdrawn') NOT NULL DEFAULT 'draft',
  `revision` int(10) unsigned NOT NULL DEFAULT 1 COMMENT 'counts each keeping, so that of two writers the second is told',
  `ciphertext` mediumblob NOT NULL COMMENT 'AES-256-GCM of the JSON: the text with its fields',
  `items` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'items of the evidence that go with it' CHECK (json_valid(`items`)),
  `template_version_id` int(10) unsigned DEFAULT NULL,
  `author` char(36) NOT NULL COMMENT 'who wrote it last',
  `figures_digest` char(64) DEFAULT NULL COMMENT 'of the figures that were submitted',
  `submitted_at` datetime(3) DEFAULT NULL,
  `decided_by` char(36) DEFAULT NULL,
  `decided_at` datetime(3) DEFAULT NULL,
  `reply_id` int(10) unsigned DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  `updated_at` datetime(3) NOT NULL,
  `open_complaint_id` int(10) unsigned GENERATED ALWAYS AS (if(`state` in ('draft','submitted'),`complaint_id`,NULL)) STORED,
  PRIMARY KEY (`id`),
  UNIQUE KEY `complaint_answers_open` (`open_complaint_id`),
  KEY `complaint_answers_complaint` (`complaint_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_attachments` (
  `complaint_id` int(10) unsigned NOT NULL,
  `media_type` varchar(40) NOT NULL COMMENT 'by its first bytes; the name that the resident gave it is not kept',
  `byte_count` int(10) unsigned NOT NULL,
  `ciphertext` mediumblob NOT NULL COMMENT 'AES-256-GCM of the file',
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`complaint_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_contacts` (
  `complaint_id` int(10) unsigned NOT NULL,
  `network_id` int(10) unsigned NOT NULL,
  `kind` enum('email','phone','none') NOT NULL COMMENT 'none: looked at, and there is nothing to know the person by',
  `digest` binary(32) NOT NULL COMMENT 'keyed digest of the address or number in this network: alike for the same one, and not to be turned back',
  PRIMARY KEY (`complaint_id`,`kind`),
  KEY `complaint_contacts_digest` (`network_id`,`digest`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_keys` (
  `complaint_id` int(10) unsigned NOT NULL,
  `wrapped_key` varbinary(80) NOT NULL COMMENT 'AES-256-GCM key wrapped by the personal-data key of the settings; destroying it erases the person',
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`complaint_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_letters` (
  `reply_id` int(10) unsigned NOT NULL,
  `complaint_id` int(10) unsigned NOT NULL,
  `ciphertext` mediumblob NOT NULL COMMENT 'AES-256-GCM of the PDF as it was sent',
  `byte_count` int(10) unsigned NOT NULL,
  `sha256` binary(32) NOT NULL COMMENT 'of the PDF',
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`reply_id`),
  KEY `complaint_letters_complaint` (`complaint_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_notes` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `complaint_id` int(10) unsigned NOT NULL,
  `ciphertext` blob NOT NULL COMMENT 'AES-256-GCM of the note: it may name somebody',
  `author` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `withdrawn_by` char(36) DEFAULT NULL,
  `withdrawn_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `complaint_notes_complaint` (`complaint_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_numbers` (
  `prefix` varchar(8) NOT NULL,
  `year` smallint(5) unsigned NOT NULL,
  `last_number` int(10) unsigned NOT NULL COMMENT 'the last one given out; a number is never given twice, even after an erasure',
  PRIMARY KEY (`prefix`,`year`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_private` (
  `complaint_id` int(10) unsigned NOT NULL,
  `ciphertext` blob NOT NULL COMMENT 'AES-256-GCM of the JSON: name, e-mail, phone, address, exact place, own words',
  `updated_at` datetime(3) NOT NULL,
  PRIMARY KEY (`complaint_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_received` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `complaint_id` int(10) unsigned NOT NULL,
  `source` enum('message','note') NOT NULL COMMENT 'an e-mail as it came, or what a person noted',
  `ciphertext` mediumblob NOT NULL COMMENT 'AES-256-GCM of the JSON: from, subject, text, Message-ID',
  `message_digest` binary(32) DEFAULT NULL COMMENT 'SHA-256 of its Message-ID: the same one is filed once',
  `received_at` datetime(3) NOT NULL,
  `filed_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `withdrawn_by` char(36) DEFAULT NULL,
  `withdrawn_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `complaint_received_once` (`complaint_id`,`message_digest`),
  KEY `complaint_received_complaint` (`complaint_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_replies` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `complaint_id` int(10) unsigned NOT NULL,
  `ciphertext` mediumblob NOT NULL COMMENT 'AES-256-GCM of the JSON: recipient, subject, body',
  `figures` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'the figures the letter carries, as sent' CHECK (json_valid(`figures`)),
  `sent_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `items` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin DEFAULT NULL COMMENT 'items of the evidence that went with it; null: sent before there was a choice' CHECK (json_valid(`items`)),
  `approved_by` char(36) DEFAULT NULL,
  `posted_by` char(36) DEFAULT NULL,
  `posted_on` date DEFAULT NULL COMMENT 'of a letter on paper',
  PRIMARY KEY (`id`),
  KEY `complaint_replies_complaint` (`complaint_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_reports` (
  `complaint_id` int(10) unsigned NOT NULL,
  `key_digest` binary(32) NOT NULL COMMENT 'SHA-256 of the key in the address of the private page; the key itself is with the resident only',
  `language` char(2) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`complaint_id`),
  UNIQUE KEY `complaint_reports_key` (`key_digest`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaint_settings` (
  `network_id` int(10) unsigned NOT NULL,
  `answer_days` tinyint(3) unsigned NOT NULL COMMENT 'working days within which a complaint is answered',
  `working_weekdays` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT '0 Monday to 6 Sunday' CHECK (json_valid(`working_weekdays`)),
  `remind_days` tinyint(3) unsigned NOT NULL COMMENT 'working days before the due date; 0: no reminder beforehand',
  `retention_months` tinyint(3) unsigned NOT NULL COMMENT 'after the end of a complaint its personal data are erased',
  `place_step_hundredths` tinyint(3) unsigned NOT NULL COMMENT 'of a degree, to which a place is rounded for all but the exact one; 0: not told',
  `changed_by` char(36) NOT NULL,
  `changed_at` datetime(3) NOT NULL,
  PRIMARY KEY (`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `complaints` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `reference` varchar(32) NOT NULL,
  `starts_at` int(10) unsigned NOT NULL,
  `ends_at` int(10) unsigned NOT NULL,
  `kind` varchar(40) NOT NULL COMMENT 'what it sounds like, from a list; own words are personal and stand apart',
  `coarse_latitude` double DEFAULT NULL COMMENT 'rounded to 0.01 degree; the exact place stands apart',
  `coarse_longitude` double DEFAULT NULL,
  `nearest_station_id` int(10) unsigned DEFAULT NULL,
  `status` enum('open','answered','closed') NOT NULL DEFAULT 'open',
  `due_on` date NOT NULL,
  `created_by` char(36) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  `answered_at` datetime(3) DEFAULT NULL,
  `closed_at` datetime(3) DEFAULT NULL,
  `closing_reason` varchar(40) DEFAULT NULL COMMENT 'from a list: a reason in own words could name somebody',
  `source` enum('desk','resident') NOT NULL DEFAULT 'desk' COMMENT 'who wrote it down: the liaison, or the resident on the public form',
  `area` varchar(80) DEFAULT NULL COMMENT 'of the list of the network; coarse, so it may stand open',
  `assigned_to` char(36) DEFAULT NULL COMMENT 'who answers it; null: nobody in particular',
  `merged_into` int(10) unsigned DEFAULT NULL COMMENT 'the complaint that this one repeats',
  `merged_from_status` enum('open','answered','closed') DEFAULT NULL COMMENT 'what it was before, to be put back when the merge is undone',
  `first_due_on` date DEFAULT NULL COMMENT 'of the first answer, once due_on is that of a later one; null: still due_on',
  PRIMARY KEY (`id`),
  UNIQUE KEY `complaints_reference` (`reference`),
  KEY `complaints_network` (`network_id`,`created_at`),
  KEY `complaints_due` (`network_id`,`status`,`due_on`),
  KEY `complaints_merged` (`merged_into`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `day_periods` (
  `station_id` int(10) unsigned NOT NULL,
  `local_date` date NOT NULL COMMENT 'the date on which the period begins',
  `period` enum('day','evening','night') NOT NULL,
  `starts_at` int(10) unsigned NOT NULL,
  `ends_at` int(10) unsigned NOT NULL,
  `valid_sec` int(10) unsigned NOT NULL,
  `excluded_sec` int(10) unsigned NOT NULL,
  `sample_sec` smallint(5) unsigned DEFAULT NULL,
  `is_sample_mixed` tinyint(1) NOT NULL,
  `a_energy_sec` double NOT NULL,
  `c_energy_sec` double NOT NULL,
  `c_valid_sec` int(10) unsigned NOT NULL,
  `lafmax_centi_db` smallint(6) DEFAULT NULL,
  `lafmin_centi_db` smallint(6) DEFAULT NULL,
  `lcpeak_centi_db` smallint(6) DEFAULT NULL,
  `band_fraction` tinyint(3) unsigned DEFAULT NULL,
  `band_energies` varbinary(600) NOT NULL,
  `a_classes` blob NOT NULL,
  `band_classes` mediumblob NOT NULL COMMENT 'class counts of every third and every octave',
  `flags` smallint(5) unsigned NOT NULL,
  `computed_at` datetime(3) NOT NULL,
  PRIMARY KEY (`station_id`,`local_date`,`period`),
  KEY `day_periods_start` (`station_id`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `deployments` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `instrument_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC',
  `ends_at` int(10) unsigned DEFAULT NULL COMMENT 'half-open; null: still there',
  `note` varchar(500) NOT NULL DEFAULT '',
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `withdrawn_by` char(36) DEFAULT NULL,
  `withdrawn_at` datetime(3) DEFAULT NULL COMMENT 'set: it was noted by mistake and never was',
  `withdrawal_reason` varchar(500) DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `deployments_station` (`station_id`,`starts_at`),
  KEY `deployments_instrument` (`instrument_id`,`starts_at`),
  KEY `deployments_network` (`network_id`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `dirty_marks` (
  `id` bigint(20) unsigned NOT NULL AUTO_INCREMENT,
  `station_id` int(10) unsigned NOT NULL,
  `quarter_starts_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC, a multiple of 900',
  `marked_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC',
  PRIMARY KEY (`station_id`,`id`),
  KEY `dirty_marks_quarter` (`station_id`,`quarter_starts_at`),
  KEY `dirty_marks_id` (`id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `disk_samples` (
  `taken_at` datetime(3) NOT NULL,
  `total_bytes` bigint(20) unsigned NOT NULL COMMENT 'of the file system that holds the data directory',
  `free_bytes` bigint(20) unsigned NOT NULL COMMENT 'that Bittern may still write',
  `database_bytes` bigint(20) unsigned NOT NULL COMMENT 'of all tables',
  `is_low` tinyint(1) NOT NULL DEFAULT 0 COMMENT 'little room then, so that operators were told; since when is the first of those without one between that is not',
  PRIMARY KEY (`taken_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `doubt_decisions` (
  `calibration_id` int(10) unsigned NOT NULL COMMENT 'the check that made the data doubtful',
  `station_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL COMMENT 'of the doubtful stretch; another beginning is another decision',
  `ends_at` int(10) unsigned NOT NULL,
  `decision` enum('keep','exclude') NOT NULL,
  `exclusion_id` int(10) unsigned DEFAULT NULL,
  `reason` varchar(500) NOT NULL,
  `decided_by` char(36) NOT NULL,
  `decided_at` datetime(3) NOT NULL,
  PRIMARY KEY (`calibration_id`,`station_id`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `escalation_steps` (
  `network_id` int(10) unsigned NOT NULL,
  `step` tinyint(3) unsigned NOT NULL COMMENT '1, 2, …',
  `after_min` smallint(5) unsigned NOT NULL COMMENT 'minutes after an exceedance was found that nobody has acknowledged',
  `user_ids` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'who is told then' CHECK (json_valid(`user_ids`)),
  `changed_by` char(36) NOT NULL,
  `changed_at` datetime(3) NOT NULL COMMENT 'what was found before is not escalated by it',
  PRIMARY KEY (`network_id`,`step`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `exceedance_mails` (
  `exceedance_id` int(10) unsigned NOT NULL,
  `outbox_id` bigint(20) unsigned NOT NULL COMMENT 'a message that tells of it, perhaps among others',
  PRIMARY KEY (`exceedance_id`,`outbox_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `exceedance_revisions` (
  `exceedance_id` int(10) unsigned NOT NULL,
  `revision` int(10) unsigned NOT NULL,
  `at` datetime(3) NOT NULL,
  `state` enum('standing','lifted') NOT NULL,
  `limit_version_id` int(10) unsigned NOT NULL,
  `ends_at` int(10) unsigned NOT NULL,
  `level_db` double NOT NULL,
  `threshold_tenths` smallint(6) NOT NULL,
  `coverage` double NOT NULL,
  PRIMARY KEY (`exceedance_id`,`revision`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci COMMENT='what was found each time; never updated';

CREATE TABLE `exceedances` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL,
  `limit_id` int(10) unsigned NOT NULL,
  `limit_version_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL,
  `ends_at` int(10) unsigned NOT NULL,
  `loudest_starts_at` int(10) unsigned DEFAULT NULL COMMENT 'of a rolling limit: the loudest of the windows that make it; level and coverage are its',
  `loudest_ends_at` int(10) unsigned DEFAULT NULL,
  `level_db` double NOT NULL,
  `threshold_tenths` smallint(6) NOT NULL,
  `coverage` double NOT NULL,
  `state` enum('standing','lifted') NOT NULL DEFAULT 'standing' COMMENT 'lifted: later data or an exclusion took it below the limit or its coverage',
  `revision` int(10) unsigned NOT NULL DEFAULT 0 COMMENT 'how often later data or a changed limit changed what was found; each revision is told once',
  `detected_at` datetime(3) NOT NULL,
  `revised_at` datetime(3) DEFAULT NULL,
  `cause` varchar(160) DEFAULT NULL,
  `cause_detail` varchar(160) DEFAULT NULL COMMENT 'the cause in own words; cause holds a word of the list',
  `note` text DEFAULT NULL,
  `acknowledged_by` char(36) DEFAULT NULL,
  `acknowledged_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `exceedances_window` (`limit_id`,`station_id`,`starts_at`),
  KEY `exceedances_network` (`network_id`,`starts_at`),
  KEY `exceedances_station` (`station_id`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `exclusions` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL,
  `ends_at` int(10) unsigned NOT NULL,
  `reason` varchar(500) NOT NULL,
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `withdrawn_by` char(36) DEFAULT NULL,
  `withdrawn_at` datetime(3) DEFAULT NULL,
  `withdrawal_reason` varchar(500) DEFAULT NULL,
  `act_id` int(10) unsigned DEFAULT NULL COMMENT 'first exclusion of those that one act made at several stations; null: made alone',
  PRIMARY KEY (`id`),
  KEY `exclusions_period` (`station_id`,`starts_at`,`ends_at`),
  KEY `exclusions_network` (`network_id`,`starts_at`),
  KEY `exclusions_act` (`network_id`,`act_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `health_settings` (
  `network_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL COMMENT '0: of the whole network',
  `thresholds` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'those that differ from what holds otherwise' CHECK (json_valid(`thresholds`)),
  `recipients` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'e-mail addresses; empty: the operators of the network; of the network only' CHECK (json_valid(`recipients`)),
  `changed_by` char(36) NOT NULL,
  `changed_at` datetime(3) NOT NULL,
  PRIMARY KEY (`network_id`,`station_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `health_troubles` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL,
  `kind` varchar(24) NOT NULL,
  `begins_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC',
  `noticed_at` datetime(3) NOT NULL,
  `measured` double DEFAULT NULL COMMENT 'what was found last, in the unit of the kind',
  `bound` double DEFAULT NULL COMMENT 'what it was held against, in the same unit',
  `fine_since` int(10) unsigned DEFAULT NULL COMMENT 'seems over since then; told when it has stayed so',
  `ends_at` int(10) unsigned DEFAULT NULL COMMENT 'null: not over',
  `is_open` tinyint(3) unsigned DEFAULT 1 COMMENT '1, or null when over: one open trouble a station and kind',
  PRIMARY KEY (`id`),
  UNIQUE KEY `health_troubles_open` (`station_id`,`kind`,`is_open`),
  KEY `health_troubles_network` (`network_id`,`begins_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `import_intervals` (
  `import_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC',
  `duration_sec` smallint(5) unsigned NOT NULL,
  `laeq_centi_db` smallint(6) NOT NULL,
  `lafmax_centi_db` smallint(6) DEFAULT NULL,
  `lafmin_centi_db` smallint(6) DEFAULT NULL,
  `lceq_centi_db` smallint(6) DEFAULT NULL,
  `lcpeak_centi_db` smallint(6) DEFAULT NULL,
  `band_set_id` smallint(5) unsigned NOT NULL,
  `band_levels_centi_db` varbinary(66) NOT NULL COMMENT 'int16 little endian a band of the set; -32768 = none',
  `flags` smallint(5) unsigned NOT NULL,
  `wind_speed_centi_ms` smallint(5) unsigned DEFAULT NULL,
  `wind_direction_deg` smallint(5) unsigned DEFAULT NULL,
  `temperature_centi_c` smallint(6) DEFAULT NULL,
  `battery_centi_v` smallint(5) unsigned DEFAULT NULL,
  `received_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC',
  PRIMARY KEY (`import_id`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci COMMENT='what an import would store, or has stored until it was undone';

CREATE TABLE `import_refusals` (
  `id` bigint(20) unsigned NOT NULL AUTO_INCREMENT,
  `import_id` int(10) unsigned NOT NULL,
  `code` varchar(32) NOT NULL,
  `detail` varchar(500) NOT NULL,
  `record` mediumtext NOT NULL COMMENT 'JSON as in the quarantine, where it goes when the import is stored',
  `starts_at` int(10) unsigned DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `import_refusals_import` (`import_id`,`id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `import_uploads` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL,
  `file_key` char(36) NOT NULL COMMENT 'name of the file of its parts in the data directory',
  `file_name` varchar(160) NOT NULL COMMENT 'as the person called it',
  `file_bytes` bigint(20) unsigned NOT NULL COMMENT 'as announced',
  `received_bytes` bigint(20) unsigned NOT NULL DEFAULT 0 COMMENT 'durable on disk, from the beginning',
  `file_digest` binary(32) DEFAULT NULL COMMENT 'SHA-256 of the unpacked file, where the sender announced it',
  `mark` varchar(200) DEFAULT NULL COMMENT 'by which the sender finds the upload again',
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `touched_at` datetime(3) NOT NULL,
  `import_id` int(10) unsigned DEFAULT NULL COMMENT 'what it became; null: not finished',
  PRIMARY KEY (`id`),
  KEY `import_uploads_network` (`network_id`,`import_id`,`id`),
  KEY `import_uploads_touched` (`touched_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `imports` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL,
  `state` enum('mapping','checking','checked','storing','stored','undoing','undone','redoing','discarding','discarded','failed') NOT NULL,
  `problem` varchar(500) DEFAULT NULL COMMENT 'why it failed, or why a redo was refused',
  `file_key` char(36) NOT NULL COMMENT 'name of the file in the data directory',
  `file_name` varchar(160) NOT NULL COMMENT 'as the person called it',
  `file_bytes` bigint(20) unsigned NOT NULL,
  `file_digest` binary(32) NOT NULL,
  `mapping` longtext DEFAULT NULL COMMENT 'JSON: what each column is',
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `bytes_done` bigint(20) unsigned NOT NULL DEFAULT 0 COMMENT 'of the file, up to the last chunk that was committed',
  `lines_done` int(10) unsigned NOT NULL DEFAULT 0,
  `start_done` int(10) unsigned NOT NULL DEFAULT 0 COMMENT 'how far an undo or the check before a redo has come, epoch seconds',
  `report` longtext NOT NULL COMMENT 'JSON: counts and first examples of the check',
  `stored_count` int(10) unsigned NOT NULL DEFAULT 0,
  `late_known_count` int(10) unsigned NOT NULL DEFAULT 0 COMMENT 'accepted by the check, stored by somebody else before the import came to it',
  `late_refused_count` int(10) unsigned NOT NULL DEFAULT 0,
  `acted_by` char(36) DEFAULT NULL COMMENT 'who stored, undid, redid or discarded it last',
  `acted_at` datetime(3) DEFAULT NULL,
  `act_reason` varchar(500) DEFAULT NULL,
  `finished_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `imports_network` (`network_id`,`id`),
  KEY `imports_state` (`state`,`id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `instruments` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `serial_number` varchar(60) NOT NULL,
  `class` tinyint(3) unsigned NOT NULL COMMENT '1 or 2 of IEC 61672-1',
  `description` varchar(160) NOT NULL DEFAULT '',
  `microphone` varchar(160) NOT NULL DEFAULT '' COMMENT 'type and serial number in own words',
  `created_by` char(36) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  `retired_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `instruments_serial` (`network_id`,`serial_number`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `interval_levels` (
  `station_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC',
  `duration_sec` smallint(5) unsigned NOT NULL,
  `laeq_centi_db` smallint(6) NOT NULL,
  `lafmax_centi_db` smallint(6) DEFAULT NULL,
  `lafmin_centi_db` smallint(6) DEFAULT NULL,
  `lceq_centi_db` smallint(6) DEFAULT NULL,
  `lcpeak_centi_db` smallint(6) DEFAULT NULL,
  `band_set_id` smallint(5) unsigned NOT NULL,
  `band_levels_centi_db` varbinary(66) NOT NULL COMMENT 'int16 little endian a band of the set; -32768 = none',
  `flags` smallint(5) unsigned NOT NULL,
  `wind_speed_centi_ms` smallint(5) unsigned DEFAULT NULL,
  `wind_direction_deg` smallint(5) unsigned DEFAULT NULL,
  `temperature_centi_c` smallint(6) DEFAULT NULL,
  `battery_centi_v` smallint(5) unsigned DEFAULT NULL,
  `import_id` int(10) unsigned DEFAULT NULL,
  `received_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC',
  PRIMARY KEY (`station_id`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci
 PARTITION BY RANGE (`starts_at`)
(PARTITION `p_open` VALUES LESS THAN MAXVALUE);

CREATE TABLE `interval_retention` (
  `network_id` int(10) unsigned NOT NULL,
  `keep_months` smallint(5) unsigned DEFAULT NULL COMMENT 'single intervals of whole months older than this are deleted; null: never',
  `changed_by` char(36) NOT NULL,
  `changed_at` datetime(3) NOT NULL,
  PRIMARY KEY (`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `invitations` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `email` varchar(254) NOT NULL,
  `name` varchar(160) NOT NULL,
  `is_administrator` tinyint(1) NOT NULL DEFAULT 0,
  `roles` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'list of network (slug) and role, given when it is accepted' CHECK (json_valid(`roles`)),
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `expires_at` datetime(3) NOT NULL COMMENT 'sending it again moves it on',
  `mails` smallint(5) unsigned NOT NULL DEFAULT 0 COMMENT 'how often it was sent',
  `last_mail_at` datetime(3) DEFAULT NULL,
  `accepted_at` datetime(3) DEFAULT NULL,
  `withdrawn_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `invitations_email` (`email`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `issued_summaries` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `month` char(7) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL,
  `revision` smallint(5) unsigned NOT NULL,
  `issued_by` char(36) NOT NULL,
  `issued_by_name` varchar(160) NOT NULL COMMENT 'as it stands in the files',
  `issued_at` datetime(3) NOT NULL,
  `note` varchar(1000) NOT NULL,
  `figures` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'levels of the month by station' CHECK (json_valid(`figures`)),
  `changes` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin DEFAULT NULL COMMENT 'figures that differ from the revision before; null: the first' CHECK (json_valid(`changes`)),
  `key_id` int(10) unsigned NOT NULL,
  `manifest` mediumtext NOT NULL COMMENT 'the very text that is signed',
  `manifest_sha256` binary(32) NOT NULL,
  `signature` binary(64) NOT NULL COMMENT 'Ed25519 of the manifest',
  PRIMARY KEY (`id`),
  UNIQUE KEY `issued_summaries_revision` (`network_id`,`month`,`revision`),
  KEY `issued_summaries_manifest` (`manifest_sha256`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `issued_summary_files` (
  `summary_id` int(10) unsigned NOT NULL,
  `format` varchar(10) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL,
  `name` varchar(160) NOT NULL,
  `media_type` varchar(120) NOT NULL,
  `byte_count` int(10) unsigned NOT NULL,
  `sha256` binary(32) NOT NULL COMMENT 'names the file under the data directory',
  PRIMARY KEY (`summary_id`,`format`),
  KEY `issued_summary_files_sha256` (`sha256`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `job_runs` (
  `job` varchar(60) NOT NULL,
  `slot` datetime(3) NOT NULL,
  `started_at` datetime(3) NOT NULL,
  `finished_at` datetime(3) DEFAULT NULL,
  `outcome` varchar(500) DEFAULT NULL,
  PRIMARY KEY (`job`,`slot`),
  KEY `job_runs_started` (`started_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `job_troubles` (
  `job` varchar(40) NOT NULL,
  `subject` varchar(120) NOT NULL COMMENT 'what the job could not do, such as "station 12"; nothing personal',
  `network_id` int(10) unsigned DEFAULT NULL COMMENT 'whose operators are shown it; null: administrators only',
  `failure` varchar(300) NOT NULL,
  `times` int(10) unsigned NOT NULL,
  `since` datetime(3) NOT NULL,
  `last_at` datetime(3) NOT NULL,
  `rests_until` datetime(3) NOT NULL COMMENT 'not tried before',
  PRIMARY KEY (`job`,`subject`),
  KEY `job_troubles_network` (`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `known_origins` (
  `user_id` char(36) NOT NULL,
  `kind` enum('device','address','place') NOT NULL COMMENT 'place: a browser at an address',
  `digest` binary(32) NOT NULL,
  `first_at` datetime(3) NOT NULL,
  `last_at` datetime(3) NOT NULL,
  PRIMARY KEY (`user_id`,`kind`,`digest`),
  KEY `known_origins_age` (`last_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_bin;

CREATE TABLE `leases` (
  `name` varchar(120) NOT NULL COMMENT 'what is done by one process at a time',
  `holder` char(36) NOT NULL COMMENT 'of a process',
  `taken_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds by the database clock',
  `expires_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds by the database clock; renewed while it is held',
  PRIMARY KEY (`name`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `letter_templates` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `template` int(10) unsigned NOT NULL COMMENT 'number of the template in its network, the same in all its versions',
  `version` int(10) unsigned NOT NULL,
  `name` varchar(120) NOT NULL,
  `body` text NOT NULL COMMENT 'text with fields such as {{laeq}}',
  `is_withdrawn` tinyint(1) NOT NULL DEFAULT 0 COMMENT 'this version withdraws the template',
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `letter_templates_version` (`network_id`,`template`,`version`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `limit_versions` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `limit_id` int(10) unsigned NOT NULL,
  `version` smallint(5) unsigned NOT NULL,
  `effective_from` int(10) unsigned NOT NULL COMMENT 'epoch seconds; windows that begin from here on are judged by it',
  `name` varchar(160) NOT NULL,
  `metric` enum('LAeq','LAFmax','bandLeq','LAN','LAE','Lden','bandGroupLeq','LCeqLessLAeq','LAeqLessLA90','LAeqLessUsual','tonalShare','eventCount','eventLAE') NOT NULL,
  `averaging` enum('15min','1h','day','evening','night','length','hours','den') NOT NULL COMMENT 'length: window_min; hours: from_min to to_min of each date, one window; den: all periods of a date',
  `window_min` smallint(5) unsigned DEFAULT NULL COMMENT 'of averaging length, minutes',
  `step_min` tinyint(3) unsigned DEFAULT NULL COMMENT 'rolling windows begin so often; null: fixed',
  `band_fraction` tinyint(3) unsigned DEFAULT NULL,
  `band_index` tinyint(4) DEFAULT NULL,
  `percent` tinyint(3) unsigned DEFAULT NULL COMMENT 'of LAN, and of the background of LAeqLessLA90',
  `band_to_index` tinyint(4) DEFAULT NULL COMMENT 'of bandGroupLeq the last band',
  `event_tenths` smallint(6) DEFAULT NULL COMMENT 'of eventCount: what an event is above',
  `event_minimum_sec` smallint(5) unsigned DEFAULT NULL COMMENT 'of eventCount',
  `event_gap_sec` smallint(5) unsigned DEFAULT NULL COMMENT 'of events: gaps that are bridged; NULL: 10 s',
  `background_from_min` smallint(5) unsigned DEFAULT NULL COMMENT 'of LAeqLessLA90: hours that the background is of; NULL: the window itself',
  `background_to_min` smallint(5) unsigned DEFAULT NULL,
  `threshold_tenths` smallint(6) NOT NULL COMMENT 'exceeded when the level, rounded half up to tenths, is greater',
  `weekdays` tinyint(3) unsigned NOT NULL DEFAULT 127 COMMENT 'bit 0 Monday … bit 6 Sunday, of the local date on which the window begins',
  `holidays` enum('as-weekday','as-sunday','never','only') NOT NULL DEFAULT 'as-weekday' COMMENT 'what the dates of network_holidays are to it',
  `from_min` smallint(5) unsigned DEFAULT NULL COMMENT 'local clock, minutes after midnight; null: all day',
  `to_min` smallint(5) unsigned DEFAULT NULL COMMENT 'before from_min: across midnight',
  `minimum_coverage` double DEFAULT NULL COMMENT 'null: the network minimum',
  `wind_rule` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin DEFAULT NULL COMMENT 'which wind intervals must have to count, and which dismisses a window' CHECK (json_valid(`wind_rule`)),
  `station_ids` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin DEFAULT NULL COMMENT 'null: every station of the network' CHECK (json_valid(`station_ids`)),
  `group_id` int(10) unsigned DEFAULT NULL COMMENT 'of station_groups, which station_ids were taken from',
  `recipients` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'e-mail addresses' CHECK (json_valid(`recipients`)),
  `reason` varchar(500) NOT NULL DEFAULT '',
  `created_by` char(36) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `limit_versions_version` (`limit_id`,`version`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `limits` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `withdrawn_at` datetime(3) DEFAULT NULL,
  `withdrawn_by` char(36) DEFAULT NULL,
  `withdrawal_reason` varchar(500) DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `limits_network` (`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `link_gate` (
  `id` tinyint(3) unsigned NOT NULL,
  PRIMARY KEY (`id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `mast_assignments` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL,
  `mast_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL,
  `ends_at` int(10) unsigned DEFAULT NULL COMMENT 'NULL: goes on',
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `ended_by` char(36) DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `mast_assignments_station` (`station_id`,`starts_at`),
  KEY `mast_assignments_mast` (`mast_id`,`starts_at`),
  KEY `mast_assignments_network` (`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `mast_tokens` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `mast_id` int(10) unsigned NOT NULL,
  `digest` binary(32) NOT NULL COMMENT 'SHA-256 of the token',
  `created_by` char(36) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  `revoked_at` datetime(3) DEFAULT NULL,
  `last_used_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `mast_tokens_digest` (`digest`),
  KEY `mast_tokens_mast` (`mast_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `masts` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `code` varchar(20) NOT NULL,
  `name` varchar(160) NOT NULL,
  `latitude` double NOT NULL,
  `longitude` double NOT NULL,
  `height_m` double NOT NULL COMMENT 'of the anemometer above ground',
  `maximum_age_sec` int(10) unsigned NOT NULL DEFAULT 900 COMMENT 'how far from an interval a record may lie and still tell of it',
  `created_at` datetime(3) NOT NULL,
  `retired_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `masts_code` (`network_id`,`code`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `memberships` (
  `user_id` char(36) NOT NULL,
  `network_id` int(10) unsigned NOT NULL,
  `role` enum('operator','liaison','regulator') NOT NULL,
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`user_id`,`network_id`,`role`),
  KEY `memberships_network` (`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `network_holidays` (
  `network_id` int(10) unsigned NOT NULL,
  `date` char(10) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL COMMENT 'civil date in the zone of the network',
  `name` varchar(160) NOT NULL,
  `created_by` char(36) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`network_id`,`date`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `network_settings` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `effective_from` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC; the latest row at or before an instant holds there',
  `time_zone` varchar(64) NOT NULL,
  `day_start_min` smallint(5) unsigned NOT NULL COMMENT 'minutes after local midnight',
  `evening_start_min` smallint(5) unsigned DEFAULT NULL COMMENT 'null: a network without an evening',
  `night_start_min` smallint(5) unsigned NOT NULL,
  `minimum_coverage` double NOT NULL,
  `maximum_wind_speed_ms` double NOT NULL,
  `exclude_rain` tinyint(1) NOT NULL,
  `created_by` char(36) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `network_settings_effective` (`network_id`,`effective_from`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `networks` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `slug` varchar(64) NOT NULL,
  `name` varchar(160) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `second_factor_required` tinyint(1) NOT NULL DEFAULT 0 COMMENT 'a browser without one is let in nowhere',
  PRIMARY KEY (`id`),
  UNIQUE KEY `networks_slug` (`slug`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `outbox` (
  `id` bigint(20) unsigned NOT NULL AUTO_INCREMENT,
  `message_id` varchar(200) NOT NULL COMMENT 'fixed Message-ID, the same at every attempt',
  `dedupe_key` varchar(200) NOT NULL COMMENT 'one message a cause and recipient',
  `network_id` int(10) unsigned DEFAULT NULL,
  `kind` varchar(40) NOT NULL,
  `recipient` varchar(254) DEFAULT NULL COMMENT 'null: resolved at sending from complaint_reply_id, so that no resident stands here',
  `subject` varchar(300) NOT NULL,
  `text_body` mediumtext DEFAULT NULL,
  `html_body` mediumtext DEFAULT NULL,
  `complaint_reply_id` int(10) unsigned DEFAULT NULL,
  `state` enum('waiting','sent','dead') NOT NULL DEFAULT 'waiting',
  `attempts` smallint(5) unsigned NOT NULL DEFAULT 0,
  `next_attempt_at` datetime(3) NOT NULL,
  `leased_until` datetime(3) DEFAULT NULL,
  `lease_holder` varchar(80) DEFAULT NULL,
  `last_error` varchar(500) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  `sent_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `outbox_message_id` (`message_id`),
  UNIQUE KEY `outbox_dedupe` (`dedupe_key`),
  KEY `outbox_due` (`state`,`next_attempt_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `pending_windows` (
  `id` bigint(20) unsigned NOT NULL AUTO_INCREMENT,
  `limit_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL,
  `ends_at` int(10) unsigned NOT NULL COMMENT 'judged once the window has closed; again when its data change',
  PRIMARY KEY (`id`),
  KEY `pending_windows_due` (`ends_at`,`id`),
  KEY `pending_windows_window` (`limit_id`,`station_id`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `plant_findings` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `station_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL,
  `ends_at` int(10) unsigned NOT NULL,
  `plant_id` int(10) unsigned NOT NULL,
  `plant_version` int(10) unsigned NOT NULL COMMENT 'as the plant was noted then',
  `verdict` enum('confirmed','rejected') NOT NULL,
  `named_because` varchar(1000) NOT NULL DEFAULT '' COMMENT 'the words that named it; empty: nothing did',
  `note` varchar(500) NOT NULL DEFAULT '',
  `decided_by` char(36) NOT NULL,
  `decided_at` datetime(3) NOT NULL,
  PRIMARY KEY (`id`),
  KEY `plant_findings_station` (`station_id`,`starts_at`),
  KEY `plant_findings_plant` (`plant_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `plant_versions` (
  `plant_id` int(10) unsigned NOT NULL,
  `version` int(10) unsigned NOT NULL,
  `name` varchar(80) NOT NULL,
  `kind` enum('fan','pump','compressor','engine','transformer','alarm','other') NOT NULL,
  `latitude` double DEFAULT NULL,
  `longitude` double DEFAULT NULL,
  `minimum_rpm` double DEFAULT NULL,
  `maximum_rpm` double DEFAULT NULL COMMENT 'equal to the minimum where the speed is fixed',
  `blades` smallint(5) unsigned DEFAULT NULL,
  `poles` smallint(5) unsigned DEFAULT NULL COMMENT 'of the motor; an even number',
  `cylinders` smallint(5) unsigned DEFAULT NULL,
  `strokes` tinyint(3) unsigned DEFAULT NULL COMMENT '2 or 4',
  `mains_hz` double DEFAULT NULL,
  `tone_hz` double DEFAULT NULL COMMENT 'a frequency known for itself, as of an alarm',
  `weekdays` tinyint(3) unsigned NOT NULL COMMENT 'bit 0 Monday; of the date on which a run begins',
  `from_min` smallint(5) unsigned DEFAULT NULL COMMENT 'local minutes after midnight; null: all day',
  `to_min` smallint(5) unsigned DEFAULT NULL,
  `notes` varchar(1000) NOT NULL DEFAULT '',
  `reason` varchar(500) NOT NULL DEFAULT '',
  `created_by` char(36) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`plant_id`,`version`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `plants` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `name` varchar(80) NOT NULL,
  `version` int(10) unsigned NOT NULL COMMENT 'the version that holds now',
  `created_at` datetime(3) NOT NULL,
  `retired_at` datetime(3) DEFAULT NULL,
  `retirement_reason` varchar(500) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `plants_name` (`network_id`,`name`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `quarantine` (
  `id` bigint(20) unsigned NOT NULL AUTO_INCREMENT,
  `station_id` int(10) unsigned NOT NULL,
  `code` varchar(32) NOT NULL,
  `detail` varchar(500) NOT NULL,
  `record` mediumtext NOT NULL COMMENT 'JSON as received, with its bands',
  `record_digest` binary(32) NOT NULL COMMENT 'the same refused record sent again is kept once',
  `starts_at` int(10) unsigned DEFAULT NULL,
  `received_at` datetime(3) NOT NULL,
  `times_received` int(10) unsigned NOT NULL DEFAULT 1,
  `settled_at` datetime(3) DEFAULT NULL,
  `settled_by` char(36) DEFAULT NULL,
  `settlement` enum('released','dismissed','superseded') DEFAULT NULL COMMENT 'superseded: was stored until a released conflict replaced it',
  `settlement_reason` varchar(500) DEFAULT NULL,
  `import_id` int(10) unsigned DEFAULT NULL COMMENT 'the import that brought it; null: a post',
  PRIMARY KEY (`id`),
  UNIQUE KEY `quarantine_record` (`station_id`,`code`,`record_digest`),
  KEY `quarantine_open` (`station_id`,`settled_at`,`id`),
  KEY `quarantine_import` (`import_id`,`id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `quarter_hours` (
  `station_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC, a multiple of 900',
  `valid_sec` smallint(5) unsigned NOT NULL,
  `excluded_sec` smallint(5) unsigned NOT NULL,
  `sample_sec` smallint(5) unsigned DEFAULT NULL COMMENT 'length of the valid intervals; null when mixed or none',
  `is_sample_mixed` tinyint(1) NOT NULL,
  `a_energy_sec` double NOT NULL COMMENT 'sum over valid seconds of 10^(LAeq/10)',
  `c_energy_sec` double NOT NULL,
  `c_valid_sec` smallint(5) unsigned NOT NULL,
  `lafmax_centi_db` smallint(6) DEFAULT NULL,
  `lafmin_centi_db` smallint(6) DEFAULT NULL,
  `lcpeak_centi_db` smallint(6) DEFAULT NULL,
  `band_fraction` tinyint(3) unsigned DEFAULT NULL COMMENT 'null when no bands or mixed',
  `band_energies` varbinary(600) NOT NULL COMMENT 'see db/queries/packing',
  `a_classes` blob NOT NULL COMMENT 'LevelClassCounts of LAeq',
  `flags` smallint(5) unsigned NOT NULL COMMENT 'flags seen in the quarter, valid or not',
  `reason_bits` smallint(5) unsigned NOT NULL DEFAULT 0 COMMENT 'why seconds were left out: bit n is INVALIDITY_REASONS[n]',
  `late_sec` smallint(5) unsigned NOT NULL DEFAULT 0 COMMENT 'seconds whose intervals arrived more than an hour after they ended',
  `computed_at` datetime(3) NOT NULL,
  PRIMARY KEY (`station_id`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci
 PARTITION BY RANGE (`starts_at`)
(PARTITION `p_open` VALUES LESS THAN MAXVALUE);

CREATE TABLE `report_attempts` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `address_digest` binary(16) NOT NULL COMMENT 'keyed digest of the address and the day: it tells nobody where a report came from',
  `at` datetime(3) NOT NULL,
  PRIMARY KEY (`id`),
  KEY `report_attempts_network` (`network_id`,`at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `report_forms` (
  `network_id` int(10) unsigned NOT NULL,
  `is_open` tinyint(1) NOT NULL,
  `areas` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'names that residents choose from, each with the code of its station' CHECK (json_valid(`areas`)),
  `keeper` varchar(300) NOT NULL COMMENT 'who keeps what residents send, and how to reach them; stands in the consent text',
  `changed_by` char(36) NOT NULL,
  `changed_at` datetime(3) NOT NULL,
  PRIMARY KEY (`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `sealed_stations` (
  `station_id` int(10) unsigned NOT NULL,
  `sealed_before` int(10) unsigned NOT NULL COMMENT 'epoch seconds; what is computed of earlier time is never computed anew, and nothing of it is taken or changed',
  `kept_from` int(10) unsigned NOT NULL COMMENT 'epoch seconds; single intervals that begin before are no longer kept',
  `sealed_at` datetime(3) NOT NULL COMMENT 'deleting begins a while later, when everybody reads sums instead',
  PRIMARY KEY (`station_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `second_factors` (
  `user_id` char(36) NOT NULL,
  `sealed_secret` varbinary(255) NOT NULL COMMENT 'sealed under the personal-data key of the settings',
  `created_at` datetime(3) NOT NULL,
  `confirmed_at` datetime(3) DEFAULT NULL COMMENT 'null: begun, and not asked for yet',
  `last_step` bigint(20) unsigned NOT NULL DEFAULT 0 COMMENT 'time step of the last code accepted: none is accepted twice',
  `recovery_hashes` longtext NOT NULL COMMENT 'argon2 hashes of the recovery codes that are left' CHECK (json_valid(`recovery_hashes`)),
  PRIMARY KEY (`user_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_bin;

CREATE TABLE `self_checks` (
  `station_id` int(10) unsigned NOT NULL,
  `checked_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC',
  `level_centi_db` smallint(6) NOT NULL COMMENT 'what the monitor measured of its own source',
  `nominal_centi_db` smallint(6) NOT NULL COMMENT 'what it should have measured',
  `received_at` int(10) unsigned NOT NULL,
  PRIMARY KEY (`station_id`,`checked_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `sessions` (
  `id_digest` char(64) NOT NULL COMMENT 'SHA-256 of the session id in the cookie',
  `user_id` char(36) NOT NULL,
  `expires_at` datetime(3) NOT NULL COMMENT 'moves on while the session is used',
  `ends_at` datetime(3) NOT NULL COMMENT 'absolute lifetime',
  `created_at` datetime(3) NOT NULL,
  `from_address` varchar(45) DEFAULT NULL COMMENT 'network address that signed in, for its owner to recognise',
  `agent` varchar(255) DEFAULT NULL COMMENT 'what the browser said it is',
  `last_seen_at` datetime(3) DEFAULT NULL COMMENT 'to the minute; null: not since it began',
  PRIMARY KEY (`id_digest`),
  KEY `sessions_user` (`user_id`),
  KEY `sessions_expiry` (`expires_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `station_clocks` (
  `station_id` int(10) unsigned NOT NULL,
  `ahead_sec` double NOT NULL COMMENT 'sentAt of the newest post less our time; negative: the clock is slow, or the way was long',
  `ahead_before_sec` double NOT NULL COMMENT 'the same of the post before',
  `noted_at` datetime(3) NOT NULL,
  PRIMARY KEY (`station_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `station_day_traces` (
  `station_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL COMMENT 'beginning of a day of UTC',
  `outline` blob DEFAULT NULL COMMENT 'per minute the means of groups of thirds; NULL: waits to be made',
  `shapes` mediumblob DEFAULT NULL COMMENT 'per minute level, mean and thirds about it; NULL: waits to be made',
  `is_waiting` tinyint(3) unsigned NOT NULL DEFAULT 1 COMMENT '1: to be made; 0: made',
  PRIMARY KEY (`station_id`,`starts_at`),
  KEY `waiting` (`is_waiting`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `station_groups` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `name` varchar(160) NOT NULL,
  `station_ids` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'as they are now; limit_versions keep what they were' CHECK (json_valid(`station_ids`)),
  `changed_by` char(36) DEFAULT NULL,
  `changed_at` datetime(3) NOT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `station_groups_name` (`network_id`,`name`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `station_latest` (
  `station_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL,
  `duration_sec` smallint(5) unsigned NOT NULL,
  `laeq_centi_db` smallint(6) NOT NULL,
  `lafmax_centi_db` smallint(6) DEFAULT NULL,
  `flags` smallint(5) unsigned NOT NULL,
  `wind_speed_centi_ms` smallint(5) unsigned DEFAULT NULL,
  `battery_centi_v` smallint(5) unsigned DEFAULT NULL,
  `received_at` datetime(3) NOT NULL,
  PRIMARY KEY (`station_id`),
  KEY `station_latest_received` (`received_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `station_locks` (
  `station_id` int(10) unsigned NOT NULL,
  PRIMARY KEY (`station_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci COMMENT='a row is locked by whoever changes what is measured or computed of its station';

CREATE TABLE `station_photos` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `station_id` int(10) unsigned NOT NULL,
  `taken_on` char(10) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL COMMENT 'civil date',
  `caption` varchar(300) NOT NULL,
  `media_type` varchar(40) NOT NULL COMMENT 'as the bytes say, not as the sender said',
  `byte_count` int(10) unsigned NOT NULL,
  `sha256` binary(32) NOT NULL COMMENT 'of the file as kept, without its metadata; names it under the data directory',
  `uploaded_by` char(36) NOT NULL,
  `uploaded_at` datetime(3) NOT NULL,
  PRIMARY KEY (`id`),
  KEY `station_photos_station` (`station_id`,`taken_on`),
  KEY `station_photos_file` (`sha256`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `station_placements` (
  `station_id` int(10) unsigned NOT NULL,
  `effective_from` int(10) unsigned NOT NULL COMMENT 'epoch seconds UTC',
  `placement` enum('free-field','facade') NOT NULL,
  `facade_correction_db` double NOT NULL COMMENT 'taken off levels measured at a facade, when reporting incident sound',
  `created_by` char(36) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`station_id`,`effective_from`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci COMMENT='a station without a row has stood as its own row says ever since';

CREATE TABLE `station_tokens` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `station_id` int(10) unsigned NOT NULL,
  `digest` binary(32) NOT NULL COMMENT 'SHA-256 of the token',
  `label` varchar(60) NOT NULL DEFAULT '',
  `created_by` char(36) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  `revoked_at` datetime(3) DEFAULT NULL,
  `last_used_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `station_tokens_digest` (`digest`),
  KEY `station_tokens_station` (`station_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `stations` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `code` varchar(32) NOT NULL,
  `name` varchar(160) NOT NULL,
  `latitude` double NOT NULL,
  `longitude` double NOT NULL,
  `band_fraction` tinyint(3) unsigned NOT NULL COMMENT '1 octave, 3 one-third octave',
  `interval_sec` smallint(5) unsigned NOT NULL,
  `first_band_index` tinyint(4) NOT NULL COMMENT 'n of 1000 Hz times 10^(n/10)',
  `last_band_index` tinyint(4) NOT NULL,
  `placement` enum('free-field','facade') NOT NULL DEFAULT 'free-field',
  `facade_correction_db` double NOT NULL DEFAULT 3 COMMENT 'as of the newest placement',
  `mast_height_m` double DEFAULT NULL,
  `surroundings` varchar(500) NOT NULL DEFAULT '',
  `accepts_from` int(10) unsigned DEFAULT NULL COMMENT 'epoch seconds; older intervals are refused as too-old; null: no bound',
  `expected_flags` smallint(5) unsigned NOT NULL DEFAULT 60 COMMENT 'bits as in interval_levels.flags; by default calibration, selfcheck, rain, wind',
  `created_at` datetime(3) NOT NULL,
  `retired_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `stations_code` (`network_id`,`code`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `summary_comments` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `month` char(7) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL,
  `revision` smallint(5) unsigned NOT NULL,
  `body` varchar(2000) NOT NULL,
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `withdrawn_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `summary_comments_month` (`network_id`,`month`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `summary_drafts` (
  `network_id` int(10) unsigned NOT NULL,
  `month` char(7) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL,
  `revision` smallint(5) unsigned NOT NULL,
  `state` enum('draft','review','issuing','issued') NOT NULL DEFAULT 'draft',
  `drafted_at` datetime(3) NOT NULL,
  `computed_at` datetime(3) DEFAULT NULL COMMENT 'null: its figures wait to be made',
  `document_sha256` binary(32) DEFAULT NULL COMMENT 'names the figures under the data directory',
  `data_sha256` binary(32) DEFAULT NULL COMMENT 'digest of the intervals that the figures are of',
  `figures` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin DEFAULT NULL COMMENT 'levels of the month by station' CHECK (json_valid(`figures`)),
  `progress` smallint(5) unsigned NOT NULL DEFAULT 0 COMMENT 'stations done of the computation under way',
  `failure` varchar(500) DEFAULT NULL COMMENT 'why the last attempt came to nothing',
  `submitted_by` char(36) DEFAULT NULL,
  `submitted_at` datetime(3) DEFAULT NULL,
  `requested_by` char(36) DEFAULT NULL COMMENT 'who issues it',
  `requested_at` datetime(3) DEFAULT NULL,
  `note` varchar(1000) NOT NULL DEFAULT '' COMMENT 'what whoever issues it says about it',
  `proposal_id` int(10) unsigned DEFAULT NULL COMMENT 'what led to a revision',
  `fingerprint` binary(32) DEFAULT NULL COMMENT 'of an issued one: what it rests on, when it was compared last',
  `fingerprint_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`network_id`,`month`,`revision`),
  KEY `summary_drafts_state` (`state`,`computed_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `summary_keys` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `public_spki` varbinary(64) NOT NULL COMMENT 'Ed25519 public key, SubjectPublicKeyInfo',
  `sha256` binary(32) NOT NULL COMMENT 'of public_spki: names the key',
  `wrapped_private` varbinary(200) NOT NULL COMMENT 'AES-256-GCM of the private key under a key of the settings',
  `created_by` char(36) DEFAULT NULL COMMENT 'null: made at the first issue',
  `created_at` datetime(3) NOT NULL,
  `retired_at` datetime(3) DEFAULT NULL COMMENT 'signs nothing any more; what it signed still holds',
  `signing_network_id` int(10) unsigned GENERATED ALWAYS AS (if(`retired_at` is null,`network_id`,NULL)) STORED,
  PRIMARY KEY (`id`),
  UNIQUE KEY `summary_keys_sha256` (`sha256`),
  UNIQUE KEY `summary_keys_signing` (`signing_network_id`),
  KEY `summary_keys_network` (`network_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `summary_proposals` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `month` char(7) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL,
  `of_revision` smallint(5) unsigned NOT NULL COMMENT 'the issued revision whose figures differ',
  `changes_sha256` binary(32) NOT NULL COMMENT 'of the changes: the same ones are proposed once',
  `changes` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'station, figure, old, new, why' CHECK (json_valid(`changes`)),
  `found_at` datetime(3) NOT NULL,
  `state` enum('open','accepted','dismissed','replaced') NOT NULL DEFAULT 'open',
  `decided_by` char(36) DEFAULT NULL,
  `decided_at` datetime(3) DEFAULT NULL,
  `reason` varchar(500) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `summary_proposals_changes` (`network_id`,`month`,`of_revision`,`changes_sha256`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `summary_readers` (
  `network_id` int(10) unsigned NOT NULL,
  `user_id` char(36) NOT NULL,
  `is_told` tinyint(1) DEFAULT NULL COMMENT 'e-mail when a month is issued or revised; null: as the role has it',
  `visited_at` datetime(3) DEFAULT NULL COMMENT 'when the person looked at the months last',
  `previous_visit_at` datetime(3) DEFAULT NULL COMMENT 'what changed is told since then',
  PRIMARY KEY (`network_id`,`user_id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `summary_settings` (
  `network_id` int(10) unsigned NOT NULL,
  `version` int(10) unsigned NOT NULL COMMENT 'counts from 1; the last one holds',
  `grace_days` tinyint(3) unsigned NOT NULL COMMENT 'days after the end of a month before it is drafted',
  `template` longtext CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'how the month looks in print' CHECK (json_valid(`template`)),
  `mark_sha256` binary(32) DEFAULT NULL COMMENT 'names the mark under the data directory; null: none',
  `mark_media_type` varchar(40) DEFAULT NULL,
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  PRIMARY KEY (`network_id`,`version`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `users` (
  `id` char(36) NOT NULL,
  `email` varchar(254) NOT NULL,
  `name` varchar(160) NOT NULL,
  `password_hash` varchar(255) NOT NULL,
  `must_change_password` tinyint(1) NOT NULL DEFAULT 0 COMMENT 'the password was handed over by somebody else: it opens nothing but the page to change it',
  `is_administrator` tinyint(1) NOT NULL DEFAULT 0,
  `created_at` datetime(3) NOT NULL,
  `disabled_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `users_email` (`email`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `weather_quarantine` (
  `id` bigint(20) unsigned NOT NULL AUTO_INCREMENT,
  `mast_id` int(10) unsigned NOT NULL,
  `code` varchar(32) NOT NULL COMMENT 'of the refusal; superseded: was stored until a released record replaced it',
  `detail` varchar(500) NOT NULL,
  `record` mediumtext NOT NULL COMMENT 'JSON as received',
  `record_digest` binary(32) NOT NULL COMMENT 'the same refused record sent again is kept once',
  `starts_at` int(10) unsigned DEFAULT NULL,
  `received_at` datetime(3) NOT NULL,
  `times_received` int(10) unsigned NOT NULL DEFAULT 1,
  `settlement` enum('released','dismissed','superseded') DEFAULT NULL,
  `settlement_reason` varchar(500) DEFAULT NULL,
  `settled_at` datetime(3) DEFAULT NULL,
  `settled_by` char(36) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `weather_quarantine_record` (`mast_id`,`code`,`record_digest`),
  KEY `weather_quarantine_open` (`mast_id`,`settlement`,`id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `weather_records` (
  `mast_id` int(10) unsigned NOT NULL,
  `starts_at` int(10) unsigned NOT NULL,
  `duration_sec` smallint(5) unsigned NOT NULL,
  `wind_speed_centi_ms` smallint(5) unsigned NOT NULL COMMENT 'mean of the record',
  `wind_direction_deg` smallint(5) unsigned DEFAULT NULL COMMENT 'from',
  `rain_centi_mm` smallint(5) unsigned DEFAULT NULL COMMENT 'fallen in the record; NULL: no gauge',
  `temperature_centi_c` smallint(6) DEFAULT NULL,
  `received_at` int(10) unsigned NOT NULL,
  PRIMARY KEY (`mast_id`,`starts_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `webhook_deliveries` (
  `id` bigint(20) unsigned NOT NULL AUTO_INCREMENT,
  `webhook_id` int(10) unsigned NOT NULL,
  `event_id` char(36) NOT NULL COMMENT 'the same at every attempt',
  `event` varchar(40) NOT NULL,
  `event_key` varchar(120) NOT NULL COMMENT 'one delivery a webhook and cause',
  `body` mediumtext NOT NULL,
  `state` enum('waiting','delivered','dead') NOT NULL DEFAULT 'waiting',
  `attempts` smallint(5) unsigned NOT NULL DEFAULT 0,
  `leased_until` datetime(3) DEFAULT NULL,
  `lease_holder` varchar(80) DEFAULT NULL,
  `last_outcome` varchar(300) DEFAULT NULL,
  `created_at` datetime(3) NOT NULL,
  `last_attempt_at` datetime(3) DEFAULT NULL,
  PRIMARY KEY (`id`),
  UNIQUE KEY `webhook_deliveries_once` (`webhook_id`,`event_key`),
  KEY `webhook_deliveries_state` (`state`,`id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `webhooks` (
  `id` int(10) unsigned NOT NULL AUTO_INCREMENT,
  `network_id` int(10) unsigned NOT NULL,
  `url` varchar(500) NOT NULL,
  `salt` binary(16) NOT NULL COMMENT 'the secret is derived from it and the settings key, and stored nowhere',
  `created_by` char(36) NOT NULL,
  `created_at` datetime(3) NOT NULL,
  `ended_at` datetime(3) DEFAULT NULL,
  `failures` int(10) unsigned NOT NULL DEFAULT 0 COMMENT 'attempts that failed one after another',
  `failing_since` datetime(3) DEFAULT NULL,
  `next_attempt_at` datetime(3) NOT NULL,
  `disabled_at` datetime(3) DEFAULT NULL COMMENT 'failed too long, or was told to be gone',
  `disabled_reason` varchar(300) DEFAULT NULL,
  PRIMARY KEY (`id`),
  KEY `webhooks_network` (`network_id`,`ended_at`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TABLE `workers` (
  `id` char(36) NOT NULL COMMENT 'of a process; leases are held under it, too',
  `name` varchar(120) NOT NULL COMMENT 'machine and process number',
  `started_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds by the database clock',
  `seen_at` int(10) unsigned NOT NULL COMMENT 'epoch seconds by the database clock; refreshed while it lives',
  `buckets` varchar(200) NOT NULL DEFAULT '' COMMENT 'of stations that it computes, with commas',
  PRIMARY KEY (`id`)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_uca1400_ai_ci;

CREATE TRIGGER `issued_summaries_delete` BEFORE DELETE ON `issued_summaries` FOR EACH ROW
  SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'What is issued is never changed';

CREATE TRIGGER `issued_summaries_update` BEFORE UPDATE ON `issued_summaries` FOR EACH ROW
  SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'What is issued is never changed';

CREATE TRIGGER `issued_summary_files_delete` BEFORE DELETE ON `issued_summary_files` FOR EACH ROW
  SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'What is issued is never changed';

CREATE TRIGGER `issued_summary_files_update` BEFORE UPDATE ON `issued_summary_files` FOR EACH ROW
  SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'What is issued is never changed';
