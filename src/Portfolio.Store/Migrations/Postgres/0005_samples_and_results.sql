-- What runs leave behind: the outcomes of single iterations block by block, and the finished figures.

create table run_block (
  run        text collate "C" not null references run (id),
  block      bigint           not null check (block >= 0),
  iterations bigint           not null check (iterations >= 1),
  primary key (run, block)
);

create table sample (
  run      text collate "C" not null,
  block    bigint           not null,
  -- finish/{project}, cost/{project}, milestone/{project}/{activity}
  series   text collate "C" not null,
  codec    bigint           not null check (codec in (1, 2)),
  bytes    bytea            not null,
  -- XXH3 (64 bits) of run, series, block, codec and bytes
  checksum bigint           not null,
  primary key (run, series, block),
  foreign key (run, block) references run_block (run, block)
);

create table result_row (
  run      text collate "C" not null references run (id),
  scope    text collate "C" not null,
  position bigint           not null,
  -- of scopes within a project: what grants limited to projects reach
  project  text collate "C",
  json     bytea            not null,
  primary key (run, scope),
  unique (run, position)
);

create table grid (
  run        text collate "C" not null references run (id),
  scope      text collate "C" not null,
  metric     text collate "C" not null check (metric in ('finish', 'cost')),
  project    text collate "C",
  base_value double precision,
  mean       double precision,
  sd         double precision,
  happens    double precision not null check (happens between 0 and 1),
  bytes      bytea            not null,
  primary key (run, scope, metric)
);

create table allocation (
  run   text collate "C" not null references run (id),
  level double precision not null check (level > 0 and level < 100),
  bytes bytea            not null,
  primary key (run, level)
);
