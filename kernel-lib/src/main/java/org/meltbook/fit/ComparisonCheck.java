package org.meltbook.fit;

import java.util.List;
import java.util.Map;
import org.meltbook.base.RangeException;

/** Whether fits may be compared: the same rows, the same deviations, the same error model. */
final class ComparisonCheck {
    private ComparisonCheck() {}

    /**
     * Does nothing if the fits may be compared.
     *
     * @throws RangeException if not; the message says which differ in what
     */
    static void check(Map<String, Fit> fits) {
        if (fits.size() < 2) {
            throw new RangeException("a comparison needs two fits at least, found " + fits.size());
        }
        Map.Entry<String, Fit> first = fits.entrySet().iterator().next();
        fits.forEach((name, fit) -> {
            if (!fit.problem().loss().plain()) {
                throw new RangeException("AICc compares least-squares fits; " + name + " was fitted with "
                        + fit.problem().loss().words());
            }
            String difference = difference(first.getValue().problem(), fit.problem());
            if (!difference.isEmpty()) {
                throw new RangeException(
                        "fits of " + first.getKey() + " and " + name + " cannot be compared: " + difference);
            }
        });
    }

    private static String difference(Problem one, Problem other) {
        if (one.errors() != other.errors()) {
            return "one has " + one.errors().words() + ", the other "
                    + other.errors().words();
        }
        List<DataSet> ours = one.dataSets();
        List<DataSet> theirs = other.dataSets();
        if (ours.size() != theirs.size()) {
            return "they have " + ours.size() + " and " + theirs.size() + " data sets";
        }
        for (int d = 0; d < ours.size(); d++) {
            String difference = difference(ours.get(d), theirs.get(d));
            if (!difference.isEmpty()) {
                return (ours.size() == 1 ? "" : "in data set " + (d + 1) + " ") + difference;
            }
        }
        return "";
    }

    private static String difference(DataSet one, DataSet other) {
        if (one.size() != other.size()) {
            return "they were made on " + one.size() + " and " + other.size() + " rows";
        }
        if (one.weighting() != other.weighting()) {
            return "they have different weightings, " + one.weighting().words() + " and "
                    + other.weighting().words();
        }
        for (int i = 0; i < one.size(); i++) {
            if (one.x().at(i) != other.x().at(i) || one.y().at(i) != other.y().at(i)) {
                return "row " + (i + 1) + " differs, (" + one.x().at(i) + ", "
                        + one.y().at(i) + ") and (" + other.x().at(i) + ", "
                        + other.y().at(i) + ")";
            }
            double ours = one.deviation(i, one.y().at(i));
            double theirs = other.deviation(i, other.y().at(i));
            if (ours != theirs) {
                return "the deviation of row " + (i + 1) + " differs, " + ours + " and " + theirs;
            }
        }
        return "";
    }
}
