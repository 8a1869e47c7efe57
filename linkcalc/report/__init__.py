"""What people see: an answer becomes blocks, and blocks become text, CSV, JSON and pictures."""
