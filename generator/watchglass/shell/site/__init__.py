"""The handbook as a site: models to HTML, MkDocs as host, built beside and swapped in whole.

`html` writes models as text, `render` fills the theme's templates, `plugin` lets MkDocs carry the
pages, `folders` owns what is built where, `build` makes several editions at once. Nothing here
decides what an edition shows: that is publish's.
"""
