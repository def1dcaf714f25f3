package org.meltbook.fit;

import org.meltbook.base.NumberText;

/**
 * What a fit says of one parameter.
 *
 * @param parameter the parameter
 * @param value     its value, in its unit
 * @param error     its standard error, in its unit; NaN if the data give none
 * @param low       lower end of its 95 % interval, NaN if the data give none
 * @param high      upper end of its 95 % interval, NaN if the data give none
 * @param status    how it came to its value
 */
public record Estimate(Parameter parameter, double value, double error, double low, double high, Status status) {
    /** How a parameter came to its value. */
    public enum Status {
        /** Estimated from the data. */
        ESTIMATED("estimated"),
        /** Estimated, but its 95 % interval spans more than a factor of 100. */
        WEAK("weakly determined"),
        /** Follows from other parameters by a rule that was given. */
        TIED("follows from others"),
        /** Held at the value given. */
        HELD("held, not fitted"),
        /** Stopped by a bound: the data would rather have it beyond. */
        AT_BOUND("at its bound"),
        /** The data do not fix it, alone or apart from another parameter. */
        NOT_IDENTIFIED("not identified");

        private final String words;

        Status(String words) {
            this.words = words;
        }

        /** The status in words. */
        public String words() {
            return words;
        }
    }

    /** Value ± standard error with unit, or the value and why it has no error. */
    @Override
    public String toString() {
        String number =
                switch (status) {
                    case HELD -> NumberText.of(value) + (parameter.unit().equals("1") ? "" : " " + parameter.unit());
                    default -> NumberText.of(value, error, parameter.unit());
                };
        return parameter.label() + " = " + number + (status == Status.ESTIMATED ? "" : " (" + status.words() + ")");
    }
}
