"""What can be wrong with a question put to the analysis."""


class AnalysisError(Exception):
    """The arguments of a question contradict each other.

    Attributes:
        reason: a short id of the contradiction, e.g. ``"baseline_backwards"``; the sentence is the caller's.
        fields: the values that contradict each other, by name.
    """

    def __init__(self, reason: str, **fields: object) -> None:
        super().__init__(reason)
        self.reason = reason
        self.fields = fields

    def __str__(self) -> str:
        """The reason and its fields, for a report; people get a sentence from the wording."""
        listed = ", ".join(f"{name}={value}" for name, value in self.fields.items())
        return f"{self.reason} ({listed})" if listed else self.reason
