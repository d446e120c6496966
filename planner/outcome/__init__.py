"""What a schedule means: money, carbon, NOx, efficiency, security."""
