"""Batched computation in SI: poses, joint forces, effort, events. Knows no files, no units, no printing."""
