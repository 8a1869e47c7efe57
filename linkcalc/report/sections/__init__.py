"""Parts of the report on a stroke, a duty a file: an answer in, blocks out; none knows any format."""
