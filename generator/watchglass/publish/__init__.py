"""Publishing: what an edition shows, as models only. No markup, no files."""
