"""The edge: files, clock, command line, MkDocs, templates."""
