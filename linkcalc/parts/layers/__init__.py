"""What lies on a pin, plate by plate."""
