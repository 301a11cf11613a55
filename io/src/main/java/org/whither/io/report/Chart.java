package org.whither.io.report;

import java.awt.BasicStroke;
import java.awt.Color;
import java.awt.Font;
import java.awt.geom.Rectangle2D;
import java.util.ArrayList;
import java.util.List;
import org.jfree.chart.JFreeChart;
import org.jfree.chart.axis.NumberAxis;
import org.jfree.chart.plot.DatasetRenderingOrder;
import org.jfree.chart.plot.SeriesRenderingOrder;
import org.jfree.chart.plot.XYPlot;
import org.jfree.chart.renderer.xy.XYItemRenderer;
import org.jfree.chart.renderer.xy.XYLineAndShapeRenderer;
import org.jfree.chart.renderer.xy.XYStepAreaRenderer;
import org.jfree.chart.renderer.xy.XYStepRenderer;
import org.jfree.chart.title.TextTitle;
import org.jfree.chart.ui.HorizontalAlignment;
import org.jfree.chart.ui.RectangleInsets;
import org.jfree.data.xy.XYSeries;
import org.jfree.data.xy.XYSeriesCollection;

/**
 * A chart as inline SVG. Its colours are names that the page's style fills in ({@link ChartSvg}); its lines differ in
 * their dashes too, so that they can be told apart without colour. The legend is the page's own, beside the chart.
 */
final class Chart {
    /** How a line looks; the page's legend shows the same. */
    enum Look {
        /** What goes to the outer diameter. */
        OUTER(ChartSvg.OUTER, false),
        /** What goes to the inner diameter. */
        INNER(ChartSvg.INNER, true),
        /** What goes back into the feed, and gas that comes from a diameter and crosses the film. */
        OTHER(ChartSvg.OTHER, false),
        /** Gas that comes from a diameter and leaves there again. */
        RETURNING(ChartSvg.OTHER, true),
        /** All gas together. */
        ALL(ChartSvg.INK, false);

        private final Color colour;
        private final boolean dashed;

        Look(Color colour, boolean dashed) {
            this.colour = colour;
            this.dashed = dashed;
        }
    }

    /**
     * One line.
     *
     * @param look how it looks
     * @param second whether it is of the second of two fields that are compared: thinner
     * @param x places; for steps one more than values
     * @param y values
     */
    record Line(Look look, boolean second, double[] x, double[] y) {}

    private static final int WIDTH = 400;
    private static final int HEIGHT = 236;
    private static final Font SMALL = new Font(Font.SANS_SERIF, Font.PLAIN, 12);

    private final String xName;
    private final String yName;
    private final double xHigh;
    private boolean fromZero = true;
    private double yHigh;
    private final List<Line> steps = new ArrayList<>();
    private final List<Line> curves = new ArrayList<>();

    /**
     * An empty chart whose axes begin at 0.
     *
     * @param xName what is along x, with its unit
     * @param yName what is along y, with its unit
     * @param xHigh end of the x axis, or 0: as the lines need
     */
    Chart(String xName, String yName, double xHigh) {
        this.xName = xName;
        this.yName = yName;
        this.xHigh = xHigh;
    }

    /** Lets the x axis begin where the lines do. */
    Chart fromData() {
        fromZero = false;
        return this;
    }

    /** Lets the y axis end at a value; lines that go beyond leave the chart there. */
    Chart upTo(double value) {
        yHigh = value;
        return this;
    }

    /** Adds a histogram: value n lasts from place n to place n + 1. */
    Chart steps(Line line) {
        steps.add(line);
        return this;
    }

    /** Adds a curve. */
    Chart curve(Line line) {
        curves.add(line);
        return this;
    }

    /**
     * The chart as SVG.
     *
     * @param id unique on the page
     * @param title its name
     * @param description what it shows, for those who cannot see it
     * @throws NoCharts where this machine cannot draw text
     */
    String svg(String id, String title, String description) throws NoCharts {
        NoCharts.check();
        XYPlot plot = new XYPlot(null, axis(xName, xHigh, fromZero), axis(null, yHigh, true), null);
        plot.setBackgroundPaint(null);
        plot.setOutlineVisible(false);
        plot.setDomainGridlinesVisible(false);
        plot.setRangeGridlinePaint(ChartSvg.RULE);
        plot.setRangeGridlineStroke(new BasicStroke(0.75f));
        plot.setAxisOffset(new RectangleInsets(0, 0, 0, 0));
        plot.setInsets(new RectangleInsets(4, 0, 0, 12));
        plot.setSeriesRenderingOrder(SeriesRenderingOrder.FORWARD);
        plot.setDatasetRenderingOrder(DatasetRenderingOrder.FORWARD);
        shade(plot);
        add(plot, steps, true, new XYStepRenderer());
        add(plot, curves, false, new XYLineAndShapeRenderer(true, false));
        JFreeChart chart = new JFreeChart(null, SMALL, plot, false);
        chart.setBackgroundPaint(null);
        chart.setPadding(new RectangleInsets(0, 0, 2, 0));
        TextTitle values = new TextTitle(yName, SMALL);
        values.setPaint(ChartSvg.INK);
        values.setHorizontalAlignment(HorizontalAlignment.LEFT);
        values.setPadding(0, 0, 0, 0);
        chart.setTitle(values);
        return ChartSvg.of(
                graphics -> chart.draw(graphics, new Rectangle2D.Double(0, 0, WIDTH, HEIGHT)),
                WIDTH,
                HEIGHT,
                id,
                title,
                description);
    }

    private static NumberAxis axis(String name, double high, boolean fromZero) {
        NumberAxis axis = new NumberAxis(name);
        axis.setAutoRangeIncludesZero(fromZero);
        axis.setLabelFont(SMALL);
        axis.setTickLabelFont(SMALL);
        axis.setLabelPaint(ChartSvg.INK);
        axis.setTickLabelPaint(ChartSvg.FAINT);
        axis.setAxisLinePaint(ChartSvg.FAINT);
        axis.setTickMarkPaint(ChartSvg.FAINT);
        axis.setTickLabelInsets(new RectangleInsets(5, 5, 3, 5));
        axis.setLowerMargin(0);
        axis.setUpperMargin(name == null ? 0.06 : 0);
        if (high > 0) {
            axis.setRange(0, high);
        }
        return axis;
    }

    private static void add(XYPlot plot, List<Line> lines, boolean stepped, XYItemRenderer renderer) {
        if (lines.isEmpty()) {
            return;
        }
        int at = plot.getDataset(0) == null ? 0 : plot.getDatasetCount();
        for (int n = 0; n < lines.size(); n++) {
            Line line = lines.get(n);
            renderer.setSeriesPaint(n, line.look().colour);
            renderer.setSeriesStroke(n, stroke(line));
        }
        plot.setDataset(at, data(lines, stepped));
        plot.setRenderer(at, renderer);
    }

    /** A light shade below each histogram, so that its shape is seen at once; drawn first. */
    private void shade(XYPlot plot) {
        List<Line> first = steps.stream().filter(line -> !line.second()).toList();
        if (first.isEmpty()) {
            return;
        }
        XYStepAreaRenderer renderer = new XYStepAreaRenderer(XYStepAreaRenderer.AREA);
        for (int n = 0; n < first.size(); n++) {
            Color colour = first.get(n).look().colour;
            renderer.setSeriesPaint(n, new Color(colour.getRed(), colour.getGreen(), colour.getBlue(), 34));
        }
        plot.setDataset(0, data(first, true));
        plot.setRenderer(0, renderer);
    }

    private static XYSeriesCollection data(List<Line> lines, boolean stepped) {
        XYSeriesCollection data = new XYSeriesCollection();
        for (int n = 0; n < lines.size(); n++) {
            Line line = lines.get(n);
            XYSeries series = new XYSeries(n, false, true);
            for (int m = 0; m < line.y().length; m++) {
                series.add(line.x()[m], line.y()[m]);
            }
            if (stepped) {
                series.add(line.x()[line.y().length], line.y()[line.y().length - 1]);
            }
            data.addSeries(series);
        }
        return data;
    }

    private static BasicStroke stroke(Line line) {
        float width = line.second() ? 1.1f : 2;
        float[] dash = line.second()
                ? (line.look().dashed ? new float[] {2, 2} : new float[] {8, 3})
                : line.look().dashed ? new float[] {5, 2.5f} : null;
        return new BasicStroke(width, BasicStroke.CAP_BUTT, BasicStroke.JOIN_ROUND, 10, dash, 0);
    }
}
