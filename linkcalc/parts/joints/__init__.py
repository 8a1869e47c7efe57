"""Joints: what holds members together."""
