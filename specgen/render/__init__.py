"""From page views to files: templates, CSV files, the site, and the thin MkDocs plugin."""
