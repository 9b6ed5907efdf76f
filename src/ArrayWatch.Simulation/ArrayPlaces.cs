using ArrayWatch.Signals;
using ArrayWatch.Simulation.Faults;

namespace ArrayWatch.Simulation;

/// <summary>Where the sensors of a scene truly are, followed over time.</summary>
internal sealed class ArrayPlaces
{
    private readonly Scene _scene;
    private readonly Position[] _positions;
    private readonly DisplacementFault[] _faults;
    private readonly bool[] _acting;
    private double _nextShape = double.NegativeInfinity;

    public ArrayPlaces(Scene scene)
    {
        _scene = scene;
        _positions = new Position[scene.Geometry.Count];
        _faults = [.. scene.Faults.OfType<DisplacementFault>()];
        _acting = new bool[_faults.Length];
    }

    public ReadOnlySpan<Position> Positions => _positions;

    /// <summary>Moves the sensors to their places at a time; true when any may have moved.</summary>
    public bool Update(double sceneSeconds)
    {
        bool changed = sceneSeconds >= _nextShape;
        for (int i = 0; i < _faults.Length; i++)
        {
            bool acts = _faults[i].IsActive(sceneSeconds);
            changed |= acts != _acting[i];
            _acting[i] = acts;
        }

        if (!changed) return false;
        if (sceneSeconds >= _nextShape) _nextShape = _scene.Shape is null ? double.PositiveInfinity : sceneSeconds + _scene.ShapeStepSeconds;
        for (int n = 0; n < _positions.Length; n++)
        {
            Position p = _scene.Geometry[n];
            if (_scene.Misplacements.Count > 0) p += _scene.Misplacements[n];
            if (_scene.Shape is { } shape) p += shape.DisplacementAt(_scene.Geometry, n, sceneSeconds);
            for (int i = 0; i < _faults.Length; i++)
            {
                if (_acting[i] && _faults[i].Channels.Contains(n)) p += _faults[i].Displacement;
            }

            _positions[n] = p;
        }

        return true;
    }
}
