"""Running plans: the inline driver, what workers do, where numbers come from."""
