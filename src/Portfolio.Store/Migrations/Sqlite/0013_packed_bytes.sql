-- PostgreSQL is told here not to pack again what is packed; SQLite never does.

select 1;
