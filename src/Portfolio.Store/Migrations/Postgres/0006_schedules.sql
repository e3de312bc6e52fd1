create table schedule (
  portfolio  text collate "C" not null primary key references portfolio (id),
  cron       text collate "C" not null check (cron <> ''),
  -- null: as in the settings
  iterations bigint           check (iterations >= 1),
  enabled    bigint           not null check (enabled in (0, 1)),
  changed_at bigint           not null
);
