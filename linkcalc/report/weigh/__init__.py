"""A scale shown: blocks, tables, JSON, a chart, and its bars at true size."""
