"""What happens when supply, friction, load, flow and valve lie off their values: worst cases, bands, sensitivity."""
