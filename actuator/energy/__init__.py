"""Energy: air per cycle, ideal indicator diagram, compressor, money, carbon."""
