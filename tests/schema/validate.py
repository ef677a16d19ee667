#!/usr/bin/python3
"""Every answer of the program below a folder against its schema.

    tests/schema/validate.py FOLDER

Answers are the JSON files that name a verb. Prints what is wrong; exit status 1
when anything is, or when there is no answer at all.
"""
import json
import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parent))
import test_schema  # noqa: E402


def answers(folder):
    """(path, object) of every JSON file that is an answer."""
    for path in sorted(pathlib.Path(folder).rglob("*.json")):
        try:
            value = json.loads(path.read_text())
        except ValueError:
            continue  # what is no JSON at all is another test's matter
        if isinstance(value, dict) and "verb" in value:
            yield path, value


def wrong(value, validators=None):
    """What is wrong with one answer: a list of texts."""
    validators = validators or test_schema.validators()
    if value["verb"] not in validators:
        return [f"no schema for {value['verb']}"]
    return test_schema.mistakes(validators[value["verb"]], value)


def main(folder):
    validators = test_schema.validators()
    seen = bad = 0
    for path, value in answers(folder):
        seen += 1
        for text in wrong(value, validators):
            bad += 1
            print(f"{path}: {text}")
    return 1 if bad or not seen else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1]))
