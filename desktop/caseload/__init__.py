"""What a coach asks of many journals at once: who needs me, and why."""
