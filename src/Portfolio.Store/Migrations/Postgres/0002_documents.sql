-- The document in parts. A revision lists only what it changed; a row holds from its revision until the one that superseded it.

create table portfolio (
  id          text collate "C" not null primary key check (id <> ''),
  created_at  bigint           not null,
  archived_at bigint
);

create table part_content (
  hash  text collate "C" not null primary key check (length(hash) = 64),
  -- Brotli (RFC 7932)
  bytes bytea            not null,
  -- of the expanded content
  size  bigint           not null check (size >= 0)
);

create table revision (
  portfolio   text collate "C" not null references portfolio (id),
  number      bigint           not null check (number >= 1),
  recorded_at bigint           not null,
  actor       text collate "C" not null references api_key (id),
  note        text collate "C",
  primary key (portfolio, number)
);

create table revision_part (
  portfolio  text collate "C" not null,
  revision   bigint           not null,
  -- '' is the settings
  project    text collate "C" not null,
  position   bigint           not null check (position >= 0),
  -- null: the part was removed
  hash       text collate "C" references part_content (hash),
  -- the next revision that touched the part; the greatest 64-bit number while there is none
  superseded bigint           not null default 9223372036854775807,
  primary key (portfolio, project, revision),
  foreign key (portfolio, revision) references revision (portfolio, number),
  check (superseded > revision),
  check ((project = '') = (position = 0))
);

create index revision_part_valid on revision_part (portfolio, superseded, revision);
