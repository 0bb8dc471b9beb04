"""General-purpose classifiers on the archives of invented studios, as judges outside the program.

    python3 test/bench/studios/peers.py DIR [PROCESSES]

Reads every STUDIO.json that print.ts --write-only --exchange DIR wrote, writes STUDIO.peers.json beside it
(those already there are left alone). Needs scikit-learn 1.2 (Debian: python3-sklearn).

Each peer is handled as a careful analyst would: inputs SiO2, Al2O3, B2O3, KNaO, MgO, ZnO, cone and
ln(SiO2/Al2O3), standardised over the tiles; settings chosen by the log-loss of 5-fold cross-validation in
which a blend (or a repeated formula) is never on both sides. Probabilities are mixed with 1/3 each; how
much (1e-4 to 0.1) is chosen by the same folds, since an answer of 0 costs without end. Where a surface
was never seen the share is at least 3 / (tiles + 3), Laplace's rule.
"""

import json
import os
import sys
import time
import warnings
from multiprocessing import Pool
from pathlib import Path

os.environ.setdefault("OMP_NUM_THREADS", "1")
os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")

import numpy as np
from sklearn.ensemble import RandomForestClassifier
from sklearn.gaussian_process import GaussianProcessClassifier
from sklearn.gaussian_process.kernels import RBF, ConstantKernel
from sklearn.linear_model import LogisticRegression
from sklearn.model_selection import GroupKFold
from sklearn.pipeline import make_pipeline
from sklearn.preprocessing import PolynomialFeatures, StandardScaler

SURFACES = ["underfired", "matte", "gloss"]
SHARES = [1e-4, 1e-3, 3e-3, 1e-2, 3e-2, 0.1]
INPUTS = 8
# A Gaussian process learns its length scales on this many tiles and then takes all of them.
SCALES_FROM = 400


def inputs(rows):
    rows = np.asarray(rows, float)
    ratio = np.log(np.maximum(rows[:, 0], 0.02) / np.maximum(rows[:, 1], 0.02))
    return np.column_stack([rows, ratio])


def ridge(degree):
    def candidate(strength):
        def make(x, y):
            steps = [StandardScaler()]
            if degree > 1:
                steps += [PolynomialFeatures(degree, include_bias=False), StandardScaler()]
            return make_pipeline(*steps, LogisticRegression(C=strength, max_iter=3000)).fit(x, y)

        return make

    return [candidate(c) for c in 10.0 ** np.arange(-3, 3.1, 0.5)]


def forest():
    def candidate(leaf):
        return lambda x, y: RandomForestClassifier(
            500, min_samples_leaf=leaf, max_features=3, random_state=1
        ).fit(x, y)

    return [candidate(leaf) for leaf in (1, 2, 4, 8)]


def gaussian_process(tiles):
    """One length scale for all inputs, or one for each: the folds decide where tiles are few."""

    def candidate(scales):
        def make(x, y):
            kernel = ConstantKernel(4.0, (0.1, 1000)) * RBF(scales, (0.2, 50))
            few = np.random.default_rng(1).permutation(len(y))[:SCALES_FROM]
            if len(y) > SCALES_FROM and len(set(y[few])) == len(set(y)):
                learnt = pipeline(kernel, "fmin_l_bfgs_b").fit(x[few], y[few])[-1].kernel_
                kernels = getattr(learnt, "kernels", [learnt])
                return OneAgainstRest(kernels).fit(x, y)
            return pipeline(kernel, "fmin_l_bfgs_b").fit(x, y)

        return make

    each = candidate(np.ones(INPUTS) * 2)
    return [candidate(2.0), each] if tiles <= 150 else [each]


def pipeline(kernel, optimizer):
    return make_pipeline(
        StandardScaler(), GaussianProcessClassifier(kernel, optimizer=optimizer, random_state=1)
    )


class OneAgainstRest:
    """Each class against the rest with its own kernel, held; shares brought to a sum of 1."""

    def __init__(self, kernels):
        self.kernels = kernels

    def fit(self, x, y):
        self.classes_ = np.unique(y)
        held = self.kernels if len(self.classes_) > 2 else self.kernels[:1] * 2
        self.models = [pipeline(k, None).fit(x, y == c) for k, c in zip(held, self.classes_)]
        return self

    def predict_proba(self, x):
        shares = np.column_stack([model.predict_proba(x)[:, 1] for model in self.models])
        return shares / shares.sum(axis=1, keepdims=True)


def answers(make, x, y, asked):
    """Probability of each surface; 0 for those that were not seen."""
    rows = np.zeros((len(asked), len(SURFACES)))
    seen = np.unique(y)
    if len(seen) == 1:
        rows[:, seen[0]] = 1
        return rows
    model = make(x, y)
    rows[:, model.classes_] = model.predict_proba(asked)
    return rows


def held_out(make, x, y, groups):
    rows = np.zeros((len(y), len(SURFACES)))
    for train, test in GroupKFold(min(5, len(set(groups)))).split(x, y, groups):
        rows[test] = answers(make, x[train], y[train], x[test])
    return rows


def mixed(rows, share):
    return (1 - share) * rows + share / len(SURFACES)


def peer(candidates, x, y, groups, asked):
    least = 0 if len(set(y)) == len(SURFACES) else 3 / (len(y) + 3)
    shares = [max(share, least) for share in SHARES]

    def loss(rows, share):
        return -np.mean(np.log(mixed(rows, share)[np.arange(len(y)), y]))

    best = (np.inf, candidates[0], shares[0])
    for make in candidates:
        rows = held_out(make, x, y, groups)
        for share in shares:
            best = min(best, (loss(rows, share), make, share), key=lambda b: b[0])
    _, make, share = best
    return mixed(answers(make, x, y, asked), share)


def studio(path):
    warnings.filterwarnings("ignore")
    given = json.loads(path.read_text())
    tiles = given["tiles"]
    x = inputs([tile["inputs"] for tile in tiles])
    y = np.array([SURFACES.index(tile["surface"]) for tile in tiles])
    names = [tile["blend"] or str(tile["inputs"][:6]) for tile in tiles]
    groups = np.unique(names, return_inverse=True)[1]
    asked = inputs(given["points"])
    peers = {
        "ridge raw": ridge(1),
        "ridge quad": ridge(2),
        "forest": forest(),
        "gauss proc": gaussian_process(len(y)),
    }
    out = {}
    for name, candidates in peers.items():
        start = time.time()
        rows = peer(candidates, x, y, groups, asked)
        out[name] = {"seconds": time.time() - start, "rows": rows.round(9).tolist()}
    path.with_name(path.stem + ".peers.json").write_text(json.dumps(out))
    print(path.name, {name: round(own["seconds"], 1) for name, own in out.items()}, flush=True)


if __name__ == "__main__":
    folder = Path(sys.argv[1])
    done = {path.name for path in folder.glob("*.peers.json")}
    files = [p for p in folder.glob("*.json") if not p.name.endswith(".peers.json")]
    todo = [path for path in files if path.stem + ".peers.json" not in done]
    todo.sort(key=lambda path: path.stat().st_size)
    with Pool(int(sys.argv[2]) if len(sys.argv) > 2 else 2) as pool:
        for _ in pool.imap_unordered(studio, todo):
            pass
