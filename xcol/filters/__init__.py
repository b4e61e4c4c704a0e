"""Parts of the flow path as linear filters of the signal in time."""
