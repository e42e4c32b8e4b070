"""What runs before anything is installed: bare Python and its standard library only."""
