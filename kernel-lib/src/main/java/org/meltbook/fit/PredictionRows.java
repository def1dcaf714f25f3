package org.meltbook.fit;

import java.util.List;
import org.meltbook.base.NumberText;
import org.meltbook.base.Rows;
import org.meltbook.units.Prediction;

/** Predictions as a table: what each is called, what is known of it, and what to mind. */
public final class PredictionRows {
    private PredictionRows() {}

    /** One row a prediction. */
    public static Rows of(String title, List<Prediction> predictions) {
        Rows.Builder table = Rows.titled(title)
                .text("number", predictions.stream().map(Prediction::name).toList())
                .text("value", predictions.stream().map(PredictionRows::value).toList())
                .text(
                        "95 % interval",
                        predictions.stream().map(PredictionRows::interval).toList())
                .text(
                        "unit",
                        predictions.stream().map(p -> p.quantity().siUnit()).toList());
        List<String> minding =
                predictions.stream().map(p -> String.join("; ", p.cautions())).toList();
        return (minding.stream().allMatch(String::isEmpty) ? table : table.text("to mind", minding)).build();
    }

    private static String value(Prediction prediction) {
        return switch (prediction.standing()) {
            case AT_LEAST -> "at least " + NumberText.of(prediction.low());
            case AT_MOST -> "at most " + NumberText.of(prediction.high());
            case UNDETERMINED -> "not determined";
            case EXTRAPOLATED -> NumberText.of(prediction.value()) + " (extrapolated)";
            case WITHIN_WINDOW -> NumberText.of(prediction.value());
        };
    }

    private static String interval(Prediction prediction) {
        if (!prediction.hasValue()) {
            return "–";
        }
        return Double.isNaN(prediction.low()) || Double.isNaN(prediction.high())
                ? "not known"
                : NumberText.of(prediction.low()) + " to " + NumberText.of(prediction.high());
    }
}
