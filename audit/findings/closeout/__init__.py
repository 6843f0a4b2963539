"""The close-out: what came back from the contractor, judged again and sorted, finding by finding."""
