"""The annotated workbooks: the site's own workbooks marked, and our sheets in front of the motor list."""
