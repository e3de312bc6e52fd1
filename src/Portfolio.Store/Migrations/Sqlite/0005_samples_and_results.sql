-- What runs leave behind: the outcomes of single iterations block by block, and the finished figures.

create table run_block (
  run        text    not null references run (id),
  block      integer not null check (block >= 0),
  iterations integer not null check (iterations >= 1),
  primary key (run, block)
) strict;

create table sample (
  run      text    not null,
  block    integer not null,
  -- finish/{project}, cost/{project}, milestone/{project}/{activity}
  series   text    not null,
  codec    integer not null check (codec in (1, 2)),
  bytes    blob    not null,
  -- XXH3 (64 bits) of run, series, block, codec and bytes
  checksum integer not null,
  primary key (run, series, block),
  foreign key (run, block) references run_block (run, block)
) strict;

create table result_row (
  run      text    not null references run (id),
  scope    text    not null,
  position integer not null,
  -- of scopes within a project: what grants limited to projects reach
  project  text,
  json     blob    not null,
  primary key (run, scope),
  unique (run, position)
) strict;

create table grid (
  run        text not null references run (id),
  scope      text not null,
  metric     text not null check (metric in ('finish', 'cost')),
  project    text,
  base_value real,
  mean       real,
  sd         real,
  happens    real not null check (happens between 0 and 1),
  bytes      blob not null,
  primary key (run, scope, metric)
) strict;

create table allocation (
  run   text not null references run (id),
  level real not null check (level > 0 and level < 100),
  bytes blob not null,
  primary key (run, level)
) strict;
