package org.meltbook.flow;

/** A component of a symmetric tensor; x is the flow direction, y the gradient direction, z the neutral one. */
public enum Component {
    /** Normal component in the flow direction. */
    XX(0, 0),
    /** Normal component in the gradient direction. */
    YY(1, 1),
    /** Normal component in the neutral direction. */
    ZZ(2, 2),
    /** Shear component of flow and gradient direction. */
    XY(0, 1),
    /** Shear component of flow and neutral direction. */
    XZ(0, 2),
    /** Shear component of gradient and neutral direction. */
    YZ(1, 2);

    private final int row;
    private final int column;

    Component(int row, int column) {
        this.row = row;
        this.column = column;
    }

    /** Its row in the 3 × 3 matrix, from zero. */
    public int row() {
        return row;
    }

    /** Its column in the 3 × 3 matrix, from zero; not below the row. */
    public int column() {
        return column;
    }
}
