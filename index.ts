// Listens for Back before the router does: the window calls its listeners in the order they came.
import "@features/workings/history-entry";
import "expo-router/entry";
