-- What one revision changed: to show it, and to show its note only to who may read some of that.
create index revision_part_of on revision_part (portfolio, revision);
