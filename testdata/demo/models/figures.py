"""What a model computed, in the form in which the tests read it: the verb, where in its answer, the value in SI, how far it may be off."""
import json

_list = []


def figure(verb, path, value, tol_abs=None, why="", tol_rel=None):
    f = {"verb": verb, "path": path, "value": value}
    if tol_abs is not None:
        f["tol_abs"] = tol_abs
    if tol_rel is not None:
        f["tol_rel"] = tol_rel
    f["why"] = why
    _list.append(f)


def write():
    print("[\n" + ",\n".join(" " + json.dumps(f, ensure_ascii=False) for f in _list) + "\n]")
