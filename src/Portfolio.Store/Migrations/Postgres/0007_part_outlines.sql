-- What the other parts need to know of a content, so that a write of one part does not read them whole. Contents written before have none.

create table part_outline (
  hash  text collate "C" not null primary key references part_content (hash),
  -- in a form of the program's own
  bytes bytea            not null
);
