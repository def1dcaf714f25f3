package org.meltbook.chart;

import java.awt.BasicStroke;
import java.awt.Color;
import java.awt.Graphics2D;
import java.awt.Shape;
import java.awt.geom.AffineTransform;
import java.awt.geom.Ellipse2D;
import java.awt.geom.Path2D;
import java.awt.geom.Rectangle2D;
import org.knowm.xchart.style.markers.Marker;

/** A marker in one of seven shapes that differ without colour, filled or open. */
final class Mark extends Marker {
    /** The forms, of about equal weight to the eye. */
    enum Form {
        CIRCLE,
        SQUARE,
        TRIANGLE,
        DIAMOND,
        PENTAGON,
        CROSS,
        STAR
    }

    private static final BasicStroke OUTLINE = new BasicStroke(0.9f, BasicStroke.CAP_ROUND, BasicStroke.JOIN_MITER);
    private static final BasicStroke OPEN_OUTLINE =
            new BasicStroke(1.4f, BasicStroke.CAP_ROUND, BasicStroke.JOIN_MITER);

    private final Form kind;
    private final boolean filled;

    Mark(Form kind, boolean filled) {
        this.kind = kind;
        this.filled = filled;
    }

    /**
     * The marker of a layer of measured points.
     *
     * @param family which family of layers it belongs to
     * @param nth    how many layers of points that family had before: they alternate between filled and open
     */
    static Mark of(int family, int nth) {
        Form[] forms = Form.values();
        int turn = Palette.round(family) + nth;
        return new Mark(forms[(family + turn / 2) % forms.length], turn % 2 == 0);
    }

    @Override
    public void paint(Graphics2D g, double x, double y, int size) {
        Color colour = g.getColor();
        Shape form = AffineTransform.getTranslateInstance(x, y).createTransformedShape(shape(size / 2.0));
        g.setColor(filled ? colour : Palette.PAPER);
        g.fill(form);
        g.setColor(filled ? outline(colour) : colour);
        g.setStroke(filled ? OUTLINE : OPEN_OUTLINE);
        g.draw(form);
        g.setColor(colour);
    }

    /** A tone that parts overlapping markers. */
    private static Color outline(Color colour) {
        if (colour.equals(Color.BLACK)) {
            return Color.GRAY;
        }
        return new Color(colour.getRed() * 7 / 10, colour.getGreen() * 7 / 10, colour.getBlue() * 7 / 10);
    }

    /** The outline around the origin, with the area of a circle of the given radius, roughly. */
    private Shape shape(double r) {
        return switch (kind) {
            case CIRCLE -> new Ellipse2D.Double(-r, -r, 2 * r, 2 * r);
            case SQUARE -> new Rectangle2D.Double(-0.88 * r, -0.88 * r, 1.76 * r, 1.76 * r);
            case TRIANGLE -> ring(3, 1.35 * r, 1.35 * r, -Math.PI / 2);
            case DIAMOND -> ring(4, 1.25 * r, 1.25 * r, -Math.PI / 2);
            case PENTAGON -> ring(5, 1.12 * r, 1.12 * r, -Math.PI / 2);
            case CROSS -> cross(1.2 * r, 0.42 * r);
            case STAR -> ring(10, 1.4 * r, 0.66 * r, -Math.PI / 2);
        };
    }

    /** A closed line through points at two distances in turn. */
    private static Shape ring(int corners, double even, double odd, double start) {
        Path2D path = new Path2D.Double();
        for (int i = 0; i < corners; i++) {
            double angle = start + 2 * Math.PI * i / corners;
            double distance = i % 2 == 0 ? even : odd;
            double x = distance * Math.cos(angle);
            double y = distance * Math.sin(angle);
            if (i == 0) {
                path.moveTo(x, y);
            } else {
                path.lineTo(x, y);
            }
        }
        path.closePath();
        return path;
    }

    private static Shape cross(double arm, double half) {
        double[][] corner = {
            {-half, -arm}, {half, -arm}, {half, -half}, {arm, -half}, {arm, half}, {half, half},
            {half, arm}, {-half, arm}, {-half, half}, {-arm, half}, {-arm, -half}, {-half, -half}
        };
        Path2D path = new Path2D.Double();
        path.moveTo(corner[0][0], corner[0][1]);
        for (int i = 1; i < corner.length; i++) {
            path.lineTo(corner[i][0], corner[i][1]);
        }
        path.closePath();
        return path;
    }
}
