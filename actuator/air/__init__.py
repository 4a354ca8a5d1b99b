"""Air: ideal gas, humidity, reference states, polytropic work, exergy."""
