create table schedule (
  portfolio  text    not null primary key references portfolio (id),
  cron       text    not null check (cron <> ''),
  -- null: as in the settings
  iterations integer check (iterations >= 1),
  enabled    integer not null check (enabled in (0, 1)),
  changed_at integer not null
) strict;
